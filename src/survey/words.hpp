#pragma once
/// Numbers inside sentences stand as tokens "{0.31|length}"; draw's spell() says them in the reader's units.
#include <string>
#include <string_view>

#include "survey/fields.hpp"

namespace gg {

/// Machine name of a quantity, as the enum spells it.
std::string_view key_of(Quantity quantity);

/// "{<si>|<quantity>}" with four significant digits; a value that is not finite is written as 0.
std::string token(double si, Quantity quantity);

/// The nearest value not above (not below) `x` that a person would key in: 1, 1.5, 2, 2.5, 3, 4, 5, 6 or 8 times a
/// power of ten.  @param x  > 0 and finite; anything else gives 0.
double keyed_down(double x);
double keyed_up(double x);

}  // namespace gg

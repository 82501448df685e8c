#pragma once
/// How a number is said: rounded as a person would, with its unit, metric or imperial. Shared by pictures, screens and
/// files.
#include <optional>
#include <string>
#include <string_view>

#include "survey/fields.hpp"

namespace gg {

enum class UnitSystem : std::uint8_t { metric, imperial };

/// "0.31 m"; "1 ft 0.2 in" is never used: one unit a number ("12.2 in"). 2 to 3 significant digits.
/// What is not finite is said as "not known".
std::string say(double si, Quantity quantity, UnitSystem units);
/// The same, all digits that are meant (for cards and files): up to 6 significant.
std::string say_exactly(double si, Quantity quantity, UnitSystem units);
/// Unit a form types that field in ("m", "mm", "ns"), fixed for a field whatever its value, and its factor and offset:
/// si = typed * factor + offset.
struct TypedUnit {
    std::string name;
    double factor = 1.0, offset = 0.0;
    int decimals = 2;  ///< shown while not being edited
};
TypedUnit typed_unit(Quantity quantity, UnitSystem units);
/// A typed number, "," and "." both as decimal point, optional unit after it; nothing when it is no number.
/// A unit written out wins over the system's own: "12 in" is 0.3048 m in either.
std::optional<double> read_number(std::string_view typed, Quantity quantity, UnitSystem units);

/// A text with its numbers said: each "{0.31|length}" (SI value, name of a Quantity) becomes say()'s words.
/// What is no such token stays as it stands.
std::string spell(std::string_view words, UnitSystem units);

}  // namespace gg

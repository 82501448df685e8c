#pragma once
#include <doctest/doctest.h>

#include "reference_table.hpp"

namespace gg::test {

/// Six printed digits: half the last one is 5e-6 of the value at worst; twice that leaves room for the constant's
/// digits.
inline doctest::Approx printed(double x, double relative = 1e-5) {
    return doctest::Approx(x).epsilon(relative).scale(1e-15);
}

}  // namespace gg::test

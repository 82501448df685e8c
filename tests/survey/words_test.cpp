#include "survey/words.hpp"

#include <doctest/doctest.h>

#include <limits>

using namespace gg;

TEST_CASE("a number in a sentence stands as its SI value and its quantity's name") {
    CHECK(token(0.31, Quantity::length) == "{0.31|length}");
    CHECK(token(6e-8, Quantity::time) == "{6e-08|time}");
    CHECK(token(144.0, Quantity::count) == "{144|count}");
    CHECK(token(std::numeric_limits<double>::quiet_NaN(), Quantity::loss) == "{0|loss}");
}

TEST_CASE("a mend is rounded to what a person would key in, on the safe side") {
    CHECK(keyed_down(0.0217) == doctest::Approx(0.02));
    CHECK(keyed_up(0.0217) == doctest::Approx(0.025));
    CHECK(keyed_down(0.02) == doctest::Approx(0.02));
    CHECK(keyed_up(0.02) == doctest::Approx(0.02));
    CHECK(keyed_up(9.1) == doctest::Approx(10.0));
    CHECK(keyed_down(0.0) == 0.0);
    CHECK(keyed_up(-1.0) == 0.0);
    CHECK(keyed_up(std::numeric_limits<double>::infinity()) == 0.0);
}

#include "draw/units.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <limits>

#include "wave/constants.hpp"

using namespace gg;

namespace {
constexpr UnitSystem metric = UnitSystem::metric, imperial = UnitSystem::imperial;
}

TEST_CASE("numbers are said as a person would, with one unit") {
    CHECK(say(0.30987, Quantity::length, metric) == "0.31 m");
    CHECK(say(0.9, Quantity::length, metric) == "0.90 m");
    CHECK(say(0.0707, Quantity::length, metric) == "71 mm");
    CHECK(say(615, Quantity::length, metric) == "615 m");
    CHECK(say(0.30987, Quantity::length, imperial) == "12.2 in");
    CHECK(say(3.048, Quantity::length, imperial) == "10 ft");
    CHECK(say(0.11, Quantity::small_length, metric) == "110 mm");
    CHECK(say(0.0125, Quantity::small_length, metric) == "12.5 mm");
    CHECK(say(60e-9, Quantity::time, metric) == "60 ns");
    CHECK(say(4e8, Quantity::frequency, metric) == "400 MHz");
    CHECK(say(1.5e9, Quantity::frequency, metric) == "1.5 GHz");
    CHECK(say(0.0949e9, Quantity::speed, metric) == "0.0949 m/ns");
    CHECK(say(1.0, Quantity::attenuation, metric) == "8.69 dB/m");
    CHECK(say(0.125, Quantity::fraction, metric) == "12.5%");
    CHECK(say(8.9e-6, Quantity::fraction, metric) == "<0.01%");
    CHECK(say(pi / 4, Quantity::angle, metric) == "45\u00b0");
    CHECK(say(20, Quantity::temperature, imperial) == "68 \u00b0F");
    CHECK(say(512, Quantity::count, metric) == "512");
    CHECK(say(-0.0, Quantity::length, metric) == "0 mm");
}

TEST_CASE("what is no number is said to be not known") {
    CHECK(say(std::nan(""), Quantity::length, metric) == "not known");
    CHECK(say_exactly(std::numeric_limits<double>::infinity(), Quantity::time, metric) == "not known");
}

TEST_CASE("every quantity typed as it is written comes back to its digits, in both systems") {
    for (int q = 0; q <= static_cast<int>(Quantity::impedance); ++q) {
        for (const UnitSystem units : {metric, imperial}) {
            for (const double si : {0.0123457, 0.987654, 7.0, 12345.6, 4.3e8}) {
                const auto quantity = static_cast<Quantity>(q);
                const std::string words = say_exactly(si, quantity, units);
                const auto back = read_number(words, quantity, units);
                REQUIRE_MESSAGE(back.has_value(), words);
                // Six digits of the shown number; a temperature's offset of 18 degrees takes two of them at 0.01.
                CHECK_MESSAGE(std::abs(*back - si) <= 5e-6 * si + (quantity == Quantity::temperature ? 1e-4 : 0.0),
                              words);
            }
        }
    }
}

TEST_CASE("the unit a form types in is the unit that a bare number is read in") {
    for (int q = 0; q <= static_cast<int>(Quantity::impedance); ++q) {
        for (const UnitSystem units : {metric, imperial}) {
            const TypedUnit unit = typed_unit(static_cast<Quantity>(q), units);
            const auto read = read_number("2.5", static_cast<Quantity>(q), units);
            REQUIRE(read.has_value());
            CHECK(*read == doctest::Approx(2.5 * unit.factor + unit.offset));
        }
    }
    CHECK(typed_unit(Quantity::length, metric).name == "m");
    CHECK(typed_unit(Quantity::length, imperial).name == "ft");
}

TEST_CASE("comma and point both are the decimal sign, and a unit written out wins") {
    CHECK(*read_number("0,9", Quantity::length, metric) == doctest::Approx(0.9));
    CHECK(*read_number(" 0.9 m", Quantity::length, imperial) == doctest::Approx(0.9));
    CHECK(*read_number("12 in", Quantity::length, metric) == doctest::Approx(0.3048));
    CHECK(*read_number("12in", Quantity::small_length, metric) == doctest::Approx(0.3048));
    CHECK(*read_number("2 cm", Quantity::small_length, metric) == doctest::Approx(0.02));
    CHECK(*read_number("0,4 ghz", Quantity::frequency, metric) == doctest::Approx(4e8));
    CHECK(*read_number("-5", Quantity::temperature, metric) == doctest::Approx(-5));
    CHECK(*read_number("68 F", Quantity::temperature, metric) == doctest::Approx(20));
    CHECK(*read_number("1e3", Quantity::count, metric) == doctest::Approx(1000));
}

TEST_CASE("what is no number of that quantity is refused") {
    for (const char* typed :
         {"", " ", "-", ".", ",", "abc", "1.2.3", "1.234,5", "5 kg", "5 m 3", "nan", "inf", "1e999", "--4", "0x10"}) {
        CHECK_MESSAGE(!read_number(typed, Quantity::length, metric).has_value(), typed);
    }
    CHECK(!read_number("5 MHz", Quantity::length, metric).has_value());
    CHECK(read_number("5 MHz", Quantity::frequency, metric).has_value());
}

TEST_CASE("tokens in a text are said in the reader's units, and what is none stays") {
    CHECK(spell("Closer than {0.31|length} they look like one.", metric) == "Closer than 0.31 m they look like one.");
    CHECK(spell("Closer than {0.31|length} they look like one.", imperial) ==
          "Closer than 12.2 in they look like one.");
    CHECK(spell("{6e-8|time} and {512|count}", metric) == "60 ns and 512");
    CHECK(spell("{0.02|small_length}", metric) == "20 mm");
    for (const char* words : {"", "no token", "{", "}", "{}", "{a|length}", "{1|nothing}", "a } b { c", "{1|length"})
        CHECK(spell(words, metric) == words);
    CHECK(spell("{ {1|length}", metric) == "{ 1.00 m");
}

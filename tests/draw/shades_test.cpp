#include "draw/shades.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <array>
#include <cmath>

using namespace gg;

namespace {

using Triple = std::array<double, 3>;

Triple linear(Colour c) {
    const auto part = [](std::uint8_t byte) {
        const double s = byte / 255.0;
        return s <= 0.04045 ? s / 12.92 : std::pow((s + 0.055) / 1.055, 2.4);
    };
    return {part(c.r), part(c.g), part(c.b)};
}

/// CIE 1976 L*a*b* of linear sRGB, D65; matrix of IEC 61966-2-1, from memory.
Triple lab(const Triple& c) {
    const double x = (0.4124564 * c[0] + 0.3575761 * c[1] + 0.1804375 * c[2]) / 0.95047,
                 y = 0.2126729 * c[0] + 0.7151522 * c[1] + 0.0721750 * c[2],
                 z = (0.0193339 * c[0] + 0.1191920 * c[1] + 0.9503041 * c[2]) / 1.08883;
    const auto f = [](double t) { return t > 216.0 / 24389 ? std::cbrt(t) : (24389.0 / 27 * t + 16) / 116; };
    return {116 * f(y) - 16, 500 * (f(x) - f(y)), 200 * (f(y) - f(z))};
}
Triple lab(Colour c) { return lab(linear(c)); }

double apart(const Triple& a, const Triple& b) { return std::hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]); }

/// What eyes without green (or red) cones see: Vienot, Brettel & Mollon 1999 (Color Res. Appl. 24(4)), as matrices on
/// linear sRGB, from memory.
Triple green_blind(const Triple& c) {
    const double yellow = 0.29275 * c[0] + 0.70725 * c[1];
    return {yellow, yellow, -0.02234 * c[0] + 0.02234 * c[1] + c[2]};
}
Triple red_blind(const Triple& c) {
    const double yellow = 0.11238 * c[0] + 0.88762 * c[1];
    return {yellow, yellow, 0.00401 * c[0] - 0.00401 * c[1] + c[2]};
}

}  // namespace

TEST_CASE("the test's own L*a*b* has white at 100 and red where tables have it") {
    CHECK(lab(Colour{255, 255, 255})[0] == doctest::Approx(100.0).epsilon(1e-3));
    const Triple red = lab(Colour{255, 0, 0});
    CHECK(red[0] == doctest::Approx(53.24).epsilon(1e-3));
    CHECK(red[1] == doctest::Approx(80.09).epsilon(1e-3));
    CHECK(red[2] == doctest::Approx(67.20).epsilon(1e-3));
}

TEST_CASE("lightness goes one way from nothing to the strongest, the same for both signs") {
    for (const bool dark : {false, true}) {
        double before = lab(shade(0.0, dark))[0];
        for (int i = 1; i <= 64; ++i) {
            const double plus = lab(shade(i / 64.0, dark))[0], minus = lab(shade(-i / 64.0, dark))[0];
            CHECK((dark ? plus - before : before - plus) > 0.3);
            CHECK(std::abs(plus - minus) < 0.8);  // 8 bits a channel
            before = plus;
        }
        CHECK(std::abs(lab(shade(1.0, dark))[0] - lab(shade(0.0, dark))[0]) > 60);
    }
}

TEST_CASE("equal steps in strength are equal steps to the eye") {
    for (const bool dark : {false, true}) {
        for (const double sign : {-1.0, 1.0}) {
            double least = 1e9, most = 0.0;
            for (int i = 0; i < 16; ++i) {
                const double step = apart(lab(shade(sign * i / 16, dark)), lab(shade(sign * (i + 1) / 16, dark)));
                least = std::min(least, step);
                most = std::max(most, step);
            }
            CHECK_MESSAGE(most < 1.25 * least, dark, " ", sign, ": ", least, " to ", most);
        }
    }
}

TEST_CASE("red-green blind eyes tell the signs apart wherever the echo is not faint, and the strengths as well") {
    for (const bool dark : {false, true}) {
        for (const auto blind : {green_blind, red_blind}) {
            for (const double strength : {0.4, 0.7, 1.0})
                CHECK(apart(lab(blind(linear(shade(strength, dark)))), lab(blind(linear(shade(-strength, dark))))) >
                      40 * strength);
            double before = lab(blind(linear(shade(0.0, dark))))[0];
            for (int i = 1; i <= 16; ++i) {
                const double now = lab(blind(linear(shade(i / 16.0, dark))))[0];
                CHECK((dark ? now > before : now < before));
                before = now;
            }
        }
    }
}

TEST_CASE("strengths outside one, and no number, have a colour too") {
    CHECK(shade(7.0, false) == shade(1.0, false));
    CHECK(shade(-7.0, true) == shade(-1.0, true));
    CHECK(shade(std::nan(""), false) == shade(0.0, false));
    CHECK(shade(INFINITY, false) == shade(1.0, false));
}

#include "echo/cylinder_functions.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <fstream>
#include <sstream>
#include <string>

using namespace gg;

namespace {
double distance(Complex a, Complex b) { return std::abs(a - b) / std::abs(b); }
}  // namespace

TEST_CASE("Bessel and Hankel functions agree with scipy.special to 1e-10") {
    // Table: tests/reference/bessel.csv, written by tests/reference/bessel.py.
    std::ifstream file(GG_SOURCE_DIR "/tests/reference/bessel.csv");
    REQUIRE(file.good());
    std::string line;
    std::getline(file, line);
    int rows = 0;
    double worst = 0.0;
    while (std::getline(file, line)) {
        std::istringstream fields(line);
        double v[7];
        char comma;
        for (double& value : v) fields >> value >> comma;
        const Complex z{v[1], v[2]}, j{v[3], v[4]}, h{v[5], v[6]};
        const int n = static_cast<int>(v[0]);
        const CylinderFunctions f = cylinder_functions(z, 40);
        CAPTURE(n);
        CAPTURE(z);
        CHECK(distance(f.j[n], j) < 1e-10);
        CHECK(distance(f.h[n], h) < 1e-10);
        worst = std::max({worst, distance(f.j[n], j), distance(f.h[n], h)});
        ++rows;
    }
    CHECK(rows > 300);
    MESSAGE("worst relative difference " << worst);
}

TEST_CASE("The Wronskian of J and H holds at every order, with and without loss") {
    for (const Complex z :
         {Complex{0.02, 0.0}, Complex{1.3, -0.2}, Complex{2.0, 0.0}, Complex{17.0, -3.0}, Complex{59.0, -8.0}}) {
        const CylinderFunctions f = cylinder_functions(z, 40);
        for (int n = 0; n <= 40; ++n) {
            const Complex wronskian = f.j[n] * f.h_slope(n) - f.j_slope(n) * f.h[n];
            // 9.1.17 of Abramowitz & Stegun, from memory; for the second kind -2j/(pi z).
            CHECK(distance(wronskian, Complex{0.0, -2.0} / (pi * z)) < 1e-9);
        }
    }
}

TEST_CASE("Orders past the range of a double are silent, not infinite") {
    const CylinderFunctions f = cylinder_functions({1e-9, -1e-12}, 80);
    for (const Complex& value : f.h) CHECK(std::isfinite(std::abs(value)));
    CHECK(f.h[80] == Complex{});
    CHECK(std::abs(f.h[3]) > 0.0);
}

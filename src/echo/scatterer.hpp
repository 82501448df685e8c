#pragma once
/// What one round target does to a cylindrical wave: one complex number per order.
#include <vector>

#include "echo/scene.hpp"

namespace gg {

/// Wave number (1/m) and relative permittivity of what a target is made of, at one (complex) frequency.
struct Inner {
    bool metal = false;
    Complex k, permittivity;
};

/// A target in its host at one frequency.
struct Cylinder {
    double radius = 0.0;  ///< m
    Inner inside;
    double wall = 0.0;  ///< m, thickness of the wall; 0: none
    Inner wall_matter;
};

/// s_n, n = 0 .. order, the same for -n: an incident wave a_n J_n(k rho) exp(j n theta) comes back as
/// s_n a_n H_n^(2)(k rho) exp(j n theta).
/// @param host  the ground about it (not metal)
/// Metal: -J_n(ka)/H_n(ka) along, slopes across; filled and walled: field and slope (across: slope over permittivity)
/// continuous at each radius. Lossless targets give |1 + 2 s_n| = 1.
/// Source: textbook (Harrington 1961 ch. 5; Bohren & Huffman 1983 ch. 8; titles from memory); checked against section
/// 9's widths in tests/echo.
std::vector<Complex> scatter(const Cylinder& cylinder, const Inner& host, int order, Polarisation polarisation);

}  // namespace gg

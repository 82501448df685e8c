#pragma once
/// How the targets answer together: every echo between them, and by way of the boundaries above and below.
#include <vector>

#include "echo/spectra.hpp"

namespace gg {

/// A target's place and its lone answer at one frequency.
struct Scatterer {
    double x = 0.0;          ///< m
    double above = 0.0;      ///< m, host's top to the centre
    double below = 0.0;      ///< m, centre to the host's bottom; unused when the host is endless
    std::vector<Complex> s;  ///< s_n, n = 0 .. order
    std::vector<Complex>
        root;  ///< sqrt(s_n): waves are scaled by it, which keeps all entries near one and the matrix symmetric
    std::vector<Cx> to_top = {};     ///< exp(-j kz above), at the spectra's kx
    std::vector<Cx> to_bottom = {};  ///< exp(-j kz below); empty when endless
    int order() const { return static_cast<int>(s.size()) - 1; }
    int size() const { return 2 * order() + 1; }
};

/// Joint answer T, row-major, of all orders n = -order .. order of all targets in turn: with a the incident
/// coefficients scaled by root, the outgoing ones are b = root * (T a). One lone target far from every boundary has T
/// = 1.
/// @param count  points of kx, from 0, that the paths by the boundaries need
/// T = (1 - C)^-1, C holding the direct paths (Graf's addition theorem) and those by the boundaries as sums over kx.
/// Source: multiple scattering by T-matrix, textbook (Chew 1990, from memory); checked against reciprocity, energy and
/// recorded finite-difference traces in tests/echo.
std::vector<Complex> joint_answer(const std::vector<Scatterer>& targets, const Host& host, const Spectra& spectra,
                                  int count);

}  // namespace gg

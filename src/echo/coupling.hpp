#pragma once
/// How the targets answer together: every echo between them, and by way of the boundaries above and below.
#include <vector>

#include "echo/spectra.hpp"

namespace gg {

/// A depth at which targets lie, at one frequency.
struct Level {
    double above = 0.0;         ///< m, host's top to the centre
    double below = 0.0;         ///< m, centre to the host's bottom; unused when the host is endless
    std::vector<Cx> to_top;     ///< exp(-j kz above), at the spectra's kx
    std::vector<Cx> to_bottom;  ///< exp(-j kz below); empty when endless
};
Level level_at(double above, double below, const Host& host, const Spectra& spectra, int count);

/// A target's place and its lone answer at one frequency, in standing waves about its axis. With a_n the incident
/// coefficients (a_n J_n(k rho) exp(j n theta), theta from the line) its rows are
///   c_n = strength_n/2 j^n (a_n + a_-n), n = 0 .. order,  and  s_n = j strength_n/2 j^n (a_n - a_-n), n = 1 .. order,
/// in the order c_0, c_1, s_1, c_2, s_2 ... In these rows reciprocity is symmetry, a lone target answers by 1, and all
/// entries stay near one.
struct Scatterer {
    double x = 0.0;  ///< m
    const Level* level = nullptr;
    std::vector<Cx> strength;  ///< sqrt(s_0), then sqrt(2 s_n), n = 1 .. order
    int order() const { return static_cast<int>(strength.size()) - 1; }
    int rows() const { return 2 * order() + 1; }
};

/// What all paths by the boundaries meet at each kx: E = exp(j phi) = (kx + j kz)/k and its inverse, which at -kx
/// change places and sign. In pairs, real and imaginary parts apart: sums over kx are what the coupling costs.
using Two [[gnu::vector_size(16)]] = double;
struct Pairs {
    std::vector<Two> re, im;
    explicit Pairs(int count) : re(static_cast<std::size_t>(count + 1) / 2), im(re.size()) {}
    void set(int i, Cx value) {
        re[static_cast<std::size_t>(i) / 2][i & 1] = value.re;
        im[static_cast<std::size_t>(i) / 2][i & 1] = value.im;
    }
    std::size_t size() const { return re.size(); }
};
struct Directions {
    Pairs up, down;
    Directions(const Spectra& spectra, int count);
};

/// Paths from one target to another, or back to itself, by the boundaries: sums over kx that depend on n + m (an odd
/// number of reflections) or on n - m (an even one) alone, for orders |n + m| and |n - m| up to `reach`.
struct Paths {
    int reach = 0;
    std::vector<Cx> odd, even;  ///< indexed from -reach to reach

    /// @param x  m, to - from     @param count  points of kx, from 0
    Paths(const Level& to, const Level& from, double x, int reach, const Host& host, const Spectra& spectra,
          const Directions& directions, int count);
};

/// Lower triangle G, row-major, of 1 - C = G G^T, C holding the direct paths (Graf's addition theorem) and those by the
/// boundaries between all rows of all targets in turn. With u the rows of a source at the transmitter and v those of
/// one at the receiver, the echo is (G^-1 v)^T (G^-1 u).
/// No pivoting: each leading block is the same matter with fewer rows, and answers, too.
/// Source: multiple scattering by T-matrix, textbook (Chew 1990, from memory); checked against reciprocity, energy and
/// recorded finite-difference traces in tests/echo.
/// @param own  for each target its paths to itself
std::vector<Cx> couple(const std::vector<Scatterer>& targets, const std::vector<const Paths*>& own, const Host& host,
                       const Spectra& spectra, const Directions& directions, int count);

}  // namespace gg

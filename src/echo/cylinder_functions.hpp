#pragma once
/// Bessel and Hankel functions of complex argument and whole order: what waves around a cylinder are made of.
#include <vector>

#include "wave/constants.hpp"

namespace gg {

/// J_n(z) and H_n^(2)(z) for n = 0 .. order + 1 (one more than asked, so that slopes can be formed).
struct CylinderFunctions {
    Complex z;
    std::vector<Complex> j, h;

    /// First derivative with respect to z, n = 0 .. order:  C_n' = C_{n-1} - (n/z) C_n.
    Complex j_slope(int n) const { return slope(j, n); }
    Complex h_slope(int n) const { return slope(h, n); }

  private:
    Complex slope(const std::vector<Complex>& c, int n) const;
};

/// @param z      Re z > 0, Im z <= 0 (loss, time factor exp(+jwt)), 1e-9 <= |z| <= 300
/// @param order  0 to 80. Orders at which H would leave the range of a double hold 0 in both j and h: such a wave is
///               not scattered by anything.
/// Relative accuracy 1e-10 for n <= 40, |z| <= 60 (tests/reference/bessel.csv, made by scipy.special), away from real
/// zeros of J. J by Miller's backward recurrence, normalised by exp(jz) = J_0 + 2 sum j^n J_n, which does not cancel
/// for Im z <= 0; H from J, the continued fraction of H'/H (Steed; series below |z| = 2) and the Wronskian, then
/// forward recurrence. Source: Abramowitz & Stegun 1964, ch. 9 (9.1.16, 9.1.27, 9.1.44-45, 9.1.89), from memory.
CylinderFunctions cylinder_functions(Complex z, int order);

}  // namespace gg

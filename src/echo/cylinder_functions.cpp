#include "echo/cylinder_functions.hpp"

#include <algorithm>
#include <cmath>

#include "echo/fast_complex.hpp"

namespace gg {
namespace {

constexpr Complex i1{0.0, 1.0};
constexpr double euler_gamma = 0.57721566490153286061;

/// J_0 .. J_count-1.
std::vector<Complex> bessel_j(Complex z, int count) {
    const double size = std::abs(z);
    // Start where J is some 1e-17 of its largest: well past both the order and the argument.
    const double far = std::max(size, static_cast<double>(count));
    const int top = static_cast<int>(far + 14.0 + 7.0 * std::cbrt(far));
    std::vector<Complex> f(static_cast<std::size_t>(top) + 2);
    f[top + 1] = 0.0;
    f[top] = 1e-280;
    const Cx two_over_z = 2.0 / z;
    for (int n = top; n > 0; --n) {
        f[n - 1] = static_cast<double>(n) * (two_over_z * Cx{f[n]}) - Cx{f[n + 1]};
        if (std::abs(f[n - 1].real()) + std::abs(f[n - 1].imag()) >
            1e200) {  // keep in range; what falls to 0 is nothing
            for (int k = n - 1; k <= top; ++k) f[k] *= 1e-220;
        }
    }
    // exp(jz) = J0 + 2 sum j^n J_n.
    Cx sum = f[0], turned{2.0};
    for (int n = 1; n <= top; ++n) {
        turned = turn(turned);
        sum += turned * Cx{f[n]};
    }
    const Complex norm = std::exp(i1 * z) / Complex(sum);
    f.resize(static_cast<std::size_t>(count));
    for (Complex& value : f) value *= norm;
    return f;
}

/// Y_0 by Neumann's series; for |z| < 2.
Complex bessel_y0(Complex z, const std::vector<Complex>& j) {
    Complex sum = 0.0;
    double sign = -1.0;
    for (std::size_t k = 1; 2 * k < j.size(); ++k, sign = -sign) sum += sign * j[2 * k] / static_cast<double>(k);
    return 2.0 / pi * ((std::log(z / 2.0) + euler_gamma) * j[0] - 2.0 * sum);
}

/// H_0'(z) / H_0(z) for the second kind by Steed's continued fraction (modified Lentz); |z| >= 2.
Complex hankel_log_slope(Complex z) {
    // p + iq of the first kind, mirrored to the second: -1/(2z) - j - (j/z) K,  K = a1/(2(z - j) + a2/(2(z - 2j) +
    // ...)), a_k = (k - 1/2)^2.
    const Cx start = 2.0 * (Cx{z} - Cx{0.0, 1.0});
    Cx c, d = Cx{1.0} / start, value = 0.25 * d;
    for (int k = 2; k < 500; ++k) {
        const double a = (k - 0.5) * (k - 0.5);
        const Cx b = 2.0 * (Cx{z} - Cx{0.0, static_cast<double>(k)});
        d = Cx{1.0} / (b + a * d);
        c = k == 2 ? b : b + Cx{a} / c;
        const Cx factor = c * d;
        value = value * factor;
        if (std::fabs(factor.re - 1.0) + std::fabs(factor.im) < 1e-15) break;
    }
    return -0.5 / z - i1 - i1 / z * Complex(value);
}

}  // namespace

Complex CylinderFunctions::slope(const std::vector<Complex>& c, int n) const {
    return n == 0 ? -c[1] : c[n - 1] - static_cast<double>(n) / z * c[n];
}

CylinderFunctions cylinder_functions(Complex z, int order) {
    CylinderFunctions out{z, bessel_j(z, std::max(order + 2, 24)), {}};
    std::vector<Complex>& j = out.j;
    std::vector<Complex>& h = out.h;
    h.resize(static_cast<std::size_t>(order) + 2);
    h[0] = std::abs(z) < 2.0 ? j[0] - i1 * bessel_y0(z, j) : -2.0 * i1 / (pi * z) / (j[0] * hankel_log_slope(z) + j[1]);
    // Wronskian J_1 Y_0 - J_0 Y_1 = 2/(pi z), with H = J - jY.
    h[1] = (j[1] * h[0] + 2.0 * i1 / (pi * z)) / j[0];
    j.resize(static_cast<std::size_t>(order) + 2);
    for (int n = 1; n <= order; ++n) h[n + 1] = 2.0 * n / z * h[n] - h[n - 1];
    for (int n = 0; n < order + 2; ++n) {
        if (!(std::abs(h[n].real()) + std::abs(h[n].imag()) < 1e280)) {
            for (int k = n; k < order + 2; ++k) j[k] = h[k] = 0.0;
            break;
        }
    }
    return out;
}

}  // namespace gg

#include "echo/direct.hpp"

#include <algorithm>
#include <cmath>

#include "echo/cylinder_functions.hpp"
#include "echo/fast_complex.hpp"

namespace gg {
namespace {

/// Mean over one piece [a, b] of kx with sine-squared nodes (a trapezoid in the angle, spectrally accurate), times its
/// length.
template <class F>
Cx piece(double a, double b, double separation, const F& f) {
    const int n = 40 + static_cast<int>((b - a) * separation);
    Cx sum;
    for (int i = 0; i < n; ++i) {
        const double angle = 0.5 * pi * (i + 0.5) / n, s = std::sin(angle);
        sum += (b - a) * std::sin(2.0 * angle) * 0.5 * pi / n * f(a + (b - a) * s * s);
    }
    return sum;
}

}  // namespace

Complex direct_wave(const Media& media, double separation, double height, Polarisation polarisation) {
    const Complex k0 = media.ground[0].k, k1 = media.ground[1].k, eps = media.ground[1].permittivity, w = media.w;
    const bool along = polarisation == Polarisation::along;
    const double s = separation, D = 2.0 * height, rho = std::hypot(s, D);
    const CylinderFunctions free = cylinder_functions(k0 * s, 1), image = cylinder_functions(k0 * rho, 1);
    // kz0 r = far kz0 + next / kz0 + O(kx^-3) for the field across.
    const Complex far = (eps - 1.0) / (eps + 1.0), next = -eps / ((eps + 1.0) * (eps + 1.0)) * (k1 * k1 - k0 * k0);
    const Cx k02 = k0 * k0, k12 = k1 * k1, y = 1.0 / eps, far_x = far, next_x = next;
    const auto integrand = [&](double kx) {
        const Cx kz0 = root_below(k02 - Cx{kx * kx}), kz1 = root_below(k12 - Cx{kx * kx});
        const Cx g1 = along ? kz1 : y * kz1, r = (kz0 - g1) / (kz0 + g1);
        const Cx value = along ? r / kz0 : kz0 * r - far_x * kz0 - next_x / kz0;
        return 2.0 * std::cos(kx * s) * (D > 0.0 ? value * travel(kz0, D) : value);
    };
    const double a = std::min(k0.real(), k1.real()), b = std::max(k0.real(), k1.real());
    Cx sum = piece(0.0, a, s, integrand) + piece(a, b, s, integrand);
    double from = b, to = 2.0 * b;
    for (int octave = 0; octave < 6; ++octave, from = to, to *= 2.0) sum += piece(from, to, s, integrand);
    if (along) return -vacuum_permeability * w / 4.0 * (free.h[0] + Complex(sum) / pi);
    const Complex x = k0 * rho, slope = -image.h[1], bend = -image.h[0] + image.h[1] / x;
    const Complex second = k0 * k0 * bend * (D * D / (rho * rho)) + k0 * slope * (s * s / (rho * rho * rho));
    const Complex closed = -far * second + next * image.h[0];
    return (-k0 * free.h[1] / s + closed + Complex(sum) / pi) / (4.0 * w * vacuum_permittivity);
}

}  // namespace gg

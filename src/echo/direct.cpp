#include "echo/direct.hpp"

#include <algorithm>
#include <array>
#include <cmath>

#include "echo/cylinder_functions.hpp"
#include "echo/fast_complex.hpp"

namespace gg {
namespace {

/// Gauss-Legendre nodes and weights on [0, 1], by Newton's method on the Legendre polynomial.
constexpr int order = 16;
struct Rule {
    std::array<double, order> at{}, weight{};
    Rule() {
        for (int i = 0; i < order; ++i) {
            double x = std::cos(pi * (i + 0.75) / (order + 0.5)), slope = 1.0;
            for (int step = 0; step < 8; ++step) {
                double p = 1.0, before = 0.0;
                for (int n = 1; n <= order; ++n) {
                    const double next = ((2.0 * n - 1.0) * x * p - (n - 1.0) * before) / n;
                    before = p;
                    p = next;
                }
                slope = order * (x * p - before) / (x * x - 1.0);
                x -= p / slope;
            }
            at[i] = 0.5 * (1.0 - x);
            weight[i] = 1.0 / ((1.0 - x * x) * slope * slope);
        }
    }
};

/// Integral of f over [from, to] by panels of the rule.
template <class F>
Cx panels(double from, double to, int count, const F& f) {
    static const Rule rule;
    const double width = (to - from) / count;
    Cx sum;
    for (int p = 0; p < count; ++p) {
        for (int i = 0; i < order; ++i) sum += (width * rule.weight[i]) * f(from + width * (p + rule.at[i]));
    }
    return sum;
}

/// Vertical wave number right of both branch points' cuts, which hang straight down: Im <= 0 on the real axis.
Cx vertical(Cx k, Cx kx) { return -turn(root(kx - k) * root(kx + k)); }

}  // namespace

Complex direct_wave(const Media& media, double separation, double height, Polarisation polarisation) {
    const Complex k0 = media.ground[0].k, k1 = media.ground[1].k, eps = media.ground[1].permittivity, w = media.w;
    const bool along = polarisation == Polarisation::along;
    const double s = separation, D = 2.0 * height, rho = std::hypot(s, D);
    // kz0 r = far kz0 + next / kz0 + O(kx^-3) for the field across: the static image, taken out in closed form.
    const Complex far = (eps - 1.0) / (eps + 1.0), next = -eps / ((eps + 1.0) * (eps + 1.0)) * (k1 * k1 - k0 * k0);
    const Cx weight = along ? Complex{1.0} : 1.0 / eps;
    const auto f = [&](Cx kx) {
        const Cx kz0 = vertical(k0, kx), g1 = weight * vertical(k1, kx), up = kz0 - g1, total = kz0 + g1;
        const Cx value = along ? up / (total * kz0) : kz0 * (up / total - Cx{far}) - Cx{next} / kz0;
        return D > 0.0 ? value * travel(kz0, D) : value;
    };
    const auto piece = [&](Complex from, Complex to) {
        const Complex length = to - from;
        if (!(std::abs(length) > 1e-9 * std::abs(k0))) return Cx{};
        const int count = 1 + static_cast<int>(std::abs(length) * rho / 10.0);
        return panels(0.0, 0.5 * pi, count, [&](double angle) {
            const double sine = std::sin(angle), cosine = std::cos(angle);
            const Cx kx = Cx{from} + (sine * sine) * Cx{length};
            const double size = std::exp(kx.im * s), turned = kx.re * s;
            const Cx both{std::cos(turned) * (size + 1.0 / size), std::sin(turned) * (1.0 / size - size)};
            return (2.0 * sine * cosine) * Cx{length} * both * f(kx);
        });
    };
    // In straight lines by way of the branch points themselves: air's is the nearer one, ground's lies right of and
    // below it.
    double from = 2.0 * std::max(std::abs(k0), std::abs(k1));
    Cx total = piece(0.0, k0) + piece(k0, k1) + piece(k1, from);
    if (D > s) {
        for (const double end = from + 30.0 / D; from < end; from *= 1.5) total += piece(from, 1.5 * from);
    } else {
        const Cx wave = travel(Cx{from}, s), back = conj(wave);
        double near = 0.0, width = std::min(from, 8.0 / s);
        for (; near < 32.0 / s; near += width, width = std::min(2.0 * width, 8.0 / s)) {
            total += panels(near, near + width, 1, [&](double t) {
                return std::exp(-t * s) * turn(f({from, t}) * back - f({from, -t}) * wave);
            });
        }
    }
    const Complex sum = total;
    const CylinderFunctions free = cylinder_functions(k0 * s, 1), image = cylinder_functions(k0 * rho, 1);
    if (along) return -vacuum_permeability * w / 4.0 * (free.h[0] + sum / pi);
    const Complex x = k0 * rho, slope = -image.h[1], bend = -image.h[0] + image.h[1] / x;
    const Complex second = k0 * k0 * bend * (D * D / (rho * rho)) + k0 * slope * (s * s / (rho * rho * rho));
    const Complex closed = -far * second + next * image.h[0];
    return (-k0 * free.h[1] / s + closed + sum / pi) / (4.0 * w * vacuum_permittivity);
}

}  // namespace gg

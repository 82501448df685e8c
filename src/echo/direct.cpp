#include "echo/direct.hpp"

#include <algorithm>
#include <array>
#include <cmath>

#include "echo/cylinder_functions.hpp"

namespace gg {
namespace {

constexpr Complex i1{0.0, 1.0};

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
Complex panels(const Rule& rule, double from, double to, int count, const F& f) {
    const double width = (to - from) / count;
    Complex sum = 0.0;
    for (int p = 0; p < count; ++p) {
        for (int i = 0; i < order; ++i) sum += width * rule.weight[i] * f(from + width * (p + rule.at[i]));
    }
    return sum;
}

/// Vertical wave number right of both branch points' cuts, which hang straight down: Im <= 0 on the real axis.
Complex vertical(Complex k, Complex kx) { return -i1 * std::sqrt(kx - k) * std::sqrt(kx + k); }

}  // namespace

Complex direct_wave(const Media& media, double separation, double height, Polarisation polarisation) {
    const Rule rule;
    const Complex k0 = media.ground[0].k, k1 = media.ground[1].k, eps = media.ground[1].permittivity, w = media.w;
    const bool along = polarisation == Polarisation::along;
    const double s = separation, D = 2.0 * height, rho = std::hypot(s, D);
    // kz0 r = far kz0 + next / kz0 + O(kx^-3) for the field across: the static image, taken out in closed form.
    const Complex far = (eps - 1.0) / (eps + 1.0), next = -eps / ((eps + 1.0) * (eps + 1.0)) * (k1 * k1 - k0 * k0);
    const auto f = [&](Complex kx) {
        const Complex kz0 = vertical(k0, kx), kz1 = vertical(k1, kx), g1 = along ? kz1 : kz1 / eps,
                      r = (kz0 - g1) / (kz0 + g1);
        return (along ? r / kz0 : kz0 * r - far * kz0 - next / kz0) * std::exp(-i1 * kz0 * D);
    };
    const auto piece = [&](Complex from, Complex to) {
        const Complex length = to - from;
        if (!(std::abs(length) > 1e-9 * std::abs(k0))) return Complex{};
        const int count = 1 + static_cast<int>(std::abs(length) * rho / 10.0);
        return panels(rule, 0.0, 0.5 * pi, count, [&](double angle) {
            const double sine = std::sin(angle);
            const Complex kx = from + sine * sine * length;
            return length * std::sin(2.0 * angle) * 2.0 * std::cos(kx * s) * f(kx);
        });
    };
    // In straight lines by way of the branch points themselves: air's is the nearer one, ground's lies right of and
    // below it.
    double from = 2.0 * std::max(std::abs(k0), std::abs(k1));
    Complex sum = piece(0.0, k0) + piece(k0, k1) + piece(k1, from);
    if (D > s) {
        for (const double end = from + 30.0 / D; from < end; from *= 1.5) sum += piece(from, 1.5 * from);
    } else {
        const Complex wave = std::exp(-i1 * from * s);
        double near = 0.0, width = std::min(from, 8.0 / s);
        for (; near < 32.0 / s; near += width, width = std::min(2.0 * width, 8.0 / s)) {
            sum += panels(rule, near, near + width, 1, [&](double t) {
                return std::exp(-t * s) * i1 * (f({from, t}) / wave - f({from, -t}) * wave);
            });
        }
    }
    const CylinderFunctions free = cylinder_functions(k0 * s, 1), image = cylinder_functions(k0 * rho, 1);
    if (along) return -vacuum_permeability * w / 4.0 * (free.h[0] + sum / pi);
    const Complex x = k0 * rho, slope = -image.h[1], bend = -image.h[0] + image.h[1] / x;
    const Complex second = k0 * k0 * bend * (D * D / (rho * rho)) + k0 * slope * (s * s / (rho * rho * rho));
    const Complex closed = -far * second + next * image.h[0];
    return (-k0 * free.h[1] / s + closed + sum / pi) / (4.0 * w * vacuum_permittivity);
}

}  // namespace gg

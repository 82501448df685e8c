#include <algorithm>

#include "wave/models.hpp"

namespace gg::models {
namespace {

/// Two Debye relaxations, frequencies in GHz.
struct TwoDebye {
    double eps_s, eps_1, eps_inf, f1, f2;
    Complex at(double f) const {
        const double x1 = f / f1, x2 = f / f2;
        const double a1 = (eps_s - eps_1) / (1.0 + x1 * x1), a2 = (eps_1 - eps_inf) / (1.0 + x2 * x2);
        return {a1 + a2 + eps_inf, -(x1 * a1 + x2 * a2)};
    }
};

double published(double temperature) { return std::clamp(temperature, -4.0, 40.0); }
Issue flag(double temperature) { return temperature == published(temperature) ? Issue::none : Issue::outside_band; }

TwoDebye pure(double T) {
    const double theta = 300.0 / (T + 273.15) - 1.0;
    const double eps_s = 77.66 + 103.3 * theta;
    const double f1 = 20.20 - 146.4 * theta + 316.0 * theta * theta;
    return {eps_s, 0.0671 * eps_s, 3.52 - 7.52 * theta, f1, 39.8 * f1};
}

}  // namespace

Permittivity pure_water(double temperature, double frequency) {
    return {pure(published(temperature)).at(frequency * 1e-9), flag(temperature)};
}

double salt_water_conductivity(double temperature, double salinity) {
    const double T = published(temperature), S = salinity;
    const double sigma_35 = 2.903602 + T * (8.607e-2 + T * (4.738817e-4 + T * (-2.991e-6 + T * 4.3047e-9)));
    const double R15 = S * (37.5109 + S * (5.45216 + S * 1.4409e-2)) / (1004.75 + S * (182.283 + S));
    const double alpha0 = (6.9431 + S * (3.2841 - S * 9.9486e-2)) / (84.850 + S * (69.024 + S));
    const double alpha1 = 49.843 + S * (-0.2276 + S * 0.198e-2);
    return sigma_35 * R15 * (1.0 + alpha0 * (T - 15.0) / (alpha1 + T));
}

Permittivity salt_water(double temperature, double salinity, double frequency) {
    const double T = published(temperature), S = salinity, f = frequency * 1e-9;
    TwoDebye w = pure(T);
    w.eps_s *= std::exp(S * (-3.33330e-3 + S * 4.74868e-6));
    w.f1 *= 1.0 + S * (2.3232e-3 + T * (-7.9208e-5 + T * (3.6764e-6 + T * (-3.5594e-7 + T * 8.9795e-9))));
    w.eps_1 *= std::exp(S * (-6.28908e-3 + S * 1.76032e-4 - T * 9.22144e-5));
    w.f2 *= 1.0 + S * (-1.99723e-2 + T * 1.81176e-4);
    w.eps_inf *= 1.0 + S * (-2.04265e-3 + T * 1.57883e-4);
    // 18, as printed and fitted, where the exact constant is 17.975.
    const Complex conduction{0.0, -18.0 * salt_water_conductivity(T, S) / f};
    return {w.at(f) + conduction, flag(temperature)};
}

}  // namespace gg::models

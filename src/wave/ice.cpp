#include <algorithm>

#include "wave/models.hpp"

namespace gg::models {

Permittivity pure_ice(double temperature, double frequency) {
    const double T = std::clamp(temperature, -60.0, 0.0), f = frequency * 1e-9;
    const double kelvin = T + 273.15, theta = 300.0 / kelvin - 1.0, tau = 335.0 / kelvin;
    const double A = (0.00504 + 0.0062 * theta) * std::exp(-22.1 * theta);
    const double e = std::exp(-tau), gap = std::expm1(-tau);
    const double B = 0.0207 / kelvin * e / (gap * gap) + 1.16e-11 * f * f + std::exp(-9.963 + 0.0372 * T);
    return {{3.1884 + 0.00091 * T, -(A / f + B * f)}, T == temperature ? Issue::none : Issue::outside_band};
}

Permittivity dry_snow(double density, double temperature, double frequency) {
    const double rho = std::min(density * 1e-3, 0.916);
    const Permittivity ice = pure_ice(temperature, frequency);
    const double ei = ice.value.real(), loss = -ice.value.imag();
    const double e = rho <= 0.5 ? 1.0 + 1.9 * rho : 0.51 + 2.88 * rho;
    const double snow_loss =
        3.0 * loss * (rho / 0.916) * e * e * (2.0 * e + 1.0) / ((ei + 2.0 * e) * (ei + 2.0 * e * e));
    return {{e, -snow_loss}, rho < density * 1e-3 ? Issue::outside_band : ice.issue};
}

}  // namespace gg::models

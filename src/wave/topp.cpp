#include "wave/models.hpp"

namespace gg::models {

Permittivity topp(double water, double conductivity, double frequency) {
    const double th = water;
    const double K = 3.03 + th * (9.3 + th * (146.0 - th * 76.7));
    return {{K, -conduction_loss(conductivity, frequency)}, th <= 0.55 ? Issue::none : Issue::outside_band};
}

double topp_water(double permittivity) {
    const double K = permittivity;
    return -5.3e-2 + K * (2.92e-2 + K * (-5.5e-4 + K * 4.3e-6));
}

}  // namespace gg::models

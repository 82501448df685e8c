#include <algorithm>

#include "wave/models.hpp"

namespace gg::models {
namespace {
constexpr double alpha = 0.65;
constexpr double driest = 1e-6;  // m3/m3: below, the formulas divide by zero though their limit is dry soil
}  // namespace

FreeWater free_water(double temperature) {
    const double T = std::clamp(temperature, 0.0, 40.0);
    return {88.045 + T * (-0.4147 + T * (6.295e-4 + T * 1.075e-5)),
            1.1109e-10 + T * (-3.824e-12 + T * (6.938e-14 - T * 5.096e-16))};
}

double peplinski_unadjusted(const Soil& soil, FreeWater water, double frequency) {
    const double mv = std::max(soil.water, driest);
    const double beta = 1.2748 - 0.519 * soil.sand - 0.152 * soil.clay;
    const double root = 1.01 + 0.44 * soil.grain, eps_s = root * root - 0.062;
    const double x = frequency * water.relaxation;
    const double eps_fw = 4.9 + (water.still - 4.9) / (1.0 + x * x);
    return std::pow(1.0 + soil.density / soil.grain * (std::pow(eps_s, alpha) - 1.0) +
                        std::pow(mv, beta) * std::pow(eps_fw, alpha) - mv,
                    1.0 / alpha);
}

Permittivity peplinski(const Soil& soil, FreeWater water, double frequency) {
    const double mv = std::max(soil.water, driest);
    const double beta = 1.33797 - 0.603 * soil.sand - 0.166 * soil.clay;
    const double x = frequency * water.relaxation;
    const double sigma = 0.0467 + 0.2204 * soil.density - 0.4111 * soil.sand + 0.6614 * soil.clay;
    const double loss_fw = x * (water.still - 4.9) / (1.0 + x * x) +
                           conduction_loss(sigma, frequency) * (soil.grain - soil.density) / (soil.grain * mv);
    // (mv^beta eps^alpha)^(1/alpha), written so that a negative eps (very sandy, light soil) keeps its sign and is
    // caught.
    const double loss = std::pow(mv, beta / alpha) * loss_fw;
    return {{1.15 * peplinski_unadjusted(soil, water, frequency) - 0.68, -loss}, Issue::none};
}

}  // namespace gg::models

#include <algorithm>

#include "wave/models.hpp"

namespace gg::models {
namespace {
constexpr double alpha = 0.65;
constexpr double driest = 1e-6;  // m3/m3: below, the formulas divide by zero though their limit is dry soil
}  // namespace

double p527_density(double sand, double clay) {
    const double shares[] = {100.0 * sand, 100.0 * clay, 100.0 * (1.0 - sand - clay)};
    constexpr double weights[] = {0.078886, 0.038753, 0.032732};
    double kept = 0.0;
    for (const double P : shares)
        kept += P >= 1.0 ? P : 0.0;  // below 1 % a constituent is left out, as the source says
    double rho = 1.07256;
    for (int i = 0; i < 3; ++i)
        if (shares[i] >= 1.0) rho += weights[i] * std::log(100.0 * shares[i] / kept);
    return rho;
}

Permittivity soil_p527(const Soil& soil, double temperature, double frequency) {
    const double P_sand = 100.0 * soil.sand, P_clay = 100.0 * soil.clay, f = frequency * 1e-9;
    const double mv = std::max(soil.water, driest);
    const double rho_s = soil.grain, rho_b = p527_density(soil.sand, soil.clay);
    const double sigma1 = 0.0467 + 0.2204 * rho_b - 0.004111 * P_sand - 0.006614 * P_clay;
    const double sigma2 = -1.645 + 1.939 * rho_b - 0.0225622 * P_sand + 0.01594 * P_clay;
    const double x = f / 1.35, step = (sigma1 - sigma2) / (1.0 + x * x);
    const double k = 18.0 * (rho_s - rho_b) / (f * rho_s * mv);
    const Permittivity water = pure_water(temperature, frequency);
    double eps_fw = water.value.real() + k * x * step;
    double loss_fw = -water.value.imag() + k * (sigma2 + step);
    Issue issue = water.issue;
    if (!(eps_fw >= 0.0 && loss_fw >= 0.0)) issue = Issue::model_fails;
    eps_fw = std::max(eps_fw, 0.0);
    loss_fw = std::max(loss_fw, 0.0);
    const double beta1 = 1.2748 - 0.00519 * P_sand - 0.00152 * P_clay;
    const double beta2 = 1.33797 - 0.00603 * P_sand - 0.00166 * P_clay;
    const double root = 1.01 + 0.44 * rho_s, eps_sm = root * root - 0.062;
    const double eps = std::pow(
        1.0 + rho_b / rho_s * (std::pow(eps_sm, alpha) - 1.0) + std::pow(mv, beta1) * std::pow(eps_fw, alpha) - mv,
        1.0 / alpha);
    return {{eps, -std::pow(mv, beta2 / alpha) * loss_fw}, issue};
}

}  // namespace gg::models

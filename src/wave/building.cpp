#include "wave/models.hpp"

namespace gg::models {

double conduction_loss(double conductivity, double frequency) {
    return conductivity / (2.0 * pi * frequency * vacuum_permittivity);
}

Permittivity building(const std::array<double, 4>& coefficients, double frequency) {
    const auto [a, b, c, d] = coefficients;
    const double f = frequency * 1e-9;
    return {{a * std::pow(f, b), -conduction_loss(c * std::pow(f, d), frequency)}, Issue::none};
}

}  // namespace gg::models

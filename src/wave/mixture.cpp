#include "wave/models.hpp"

namespace gg::models {

Complex crim(double porosity, double saturation, Complex grain, Complex water) {
    const Complex n =
        (1.0 - porosity) * std::sqrt(grain) + saturation * porosity * std::sqrt(water) + (1.0 - saturation) * porosity;
    return n * n;
}

double archie(double pore_conductivity, double porosity, double saturation, double cementation) {
    return pore_conductivity * std::pow(porosity, cementation) * saturation * saturation;
}

Permittivity mixture(const Pores& pores, double frequency) {
    const Permittivity water = pure_water(pores.temperature, frequency);
    const double sigma = archie(pores.pore_conductivity, pores.porosity, pores.saturation, pores.cementation);
    return {crim(pores.porosity, pores.saturation, pores.grain, water.value) -
                Complex{0.0, conduction_loss(sigma, frequency)},
            water.issue};
}

}  // namespace gg::models

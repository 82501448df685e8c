#pragma once
/// What a material is to the wave: a published model and its inputs, giving complex relative permittivity.
#include <array>
#include <limits>
#include <string_view>

#include "wave/constants.hpp"
#include "wave/result.hpp"

namespace gg {

enum class Model : std::uint8_t {
    constant,   ///< permittivity and conductivity as given, the same at every frequency
    building,   ///< ITU-R P.2040: eps' = a f^b, sigma = c f^d, f in GHz
    water,      ///< ITU-R P.527: fresh to sea water, by temperature and salinity
    ice,        ///< ITU-R P.527 pure ice, by temperature
    snow,       ///< ITU-R P.527 dry snow, by density and temperature
    topp,       ///< Topp, Davis & Annan 1980: eps' from water content; loss from conductivity
    peplinski,  ///< Peplinski, Ulaby & Dobson 1995, 0.3 to 1.3 GHz
    soil_p527,  ///< ITU-R P.527 soil
    mixture,    ///< CRIM mixing of grains, water and air, with Archie's law for the conductivity
    metal       ///< reflects everything; only a target may be made of it
};

/// The inputs a model may take. Units: SI, except temperature (degrees Celsius) and salinity (g/kg).
enum class Input : std::uint8_t {
    permittivity,       ///< relative, 1 to 100
    conductivity,       ///< S/m, 0 to 10
    water,              ///< volumetric water content, m3/m3, 0 to 1
    temperature,        ///< degrees Celsius, -60 to 60
    salinity,           ///< g/kg, 0 to 40
    sand,               ///< mass fraction, 0 to 1
    clay,               ///< mass fraction, 0 to 1; sand + clay <= 1
    density,            ///< dry bulk density, kg/m3
    porosity,           ///< 0 to 1
    saturation,         ///< share of the pores that water fills, 0 to 1
    grain,              ///< relative permittivity of the grains, 2 to 12
    pore_conductivity,  ///< S/m of the pore water, at low frequency
    cementation         ///< Archie's m, 1.2 to 2.6
};
constexpr int input_count = 13;

template <class T>
struct Inputs : std::array<T, input_count> {
    T& operator[](Input i) { return std::array<T, input_count>::operator[](static_cast<std::size_t>(i)); }
    const T& operator[](Input i) const { return std::array<T, input_count>::operator[](static_cast<std::size_t>(i)); }
    bool operator==(const Inputs&) const = default;
};

struct Material {
    Model model = Model::constant;
    Inputs<double> inputs{};
    std::array<double, 4> coefficients{};  ///< a, b, c, d of Model::building; else unused
    double band_low = 0.0;                 ///< Hz, the range the source vouches for
    double band_high = std::numeric_limits<double>::infinity();
    bool operator==(const Material&) const = default;
};

/// Air, and a constant material from relative permittivity (>= 1) and conductivity (S/m, >= 0).
Material air();
Material constant_material(double permittivity, double conductivity);

struct Permittivity {
    Complex value{1.0, 0.0};  ///< eps' - j eps'', always finite, eps' >= 1, eps'' >= 0
    Issue issue = Issue::none;
};

/// Complex relative permittivity, conduction loss included.
/// @param frequency  Hz, > 0
/// Outside the material's band the model is carried on and flagged Issue::outside_band; where the model gives no
/// physical value (negative real part, NaN) the value is clamped to eps' >= 1, eps'' >= 0 and flagged
/// Issue::model_fails; an input outside its range gives Issue::out_of_range and the nearest legal input's value.
Permittivity permittivity(const Material& material, double frequency);

/// Whether `model` uses `input`: what a form has to ask for.
bool takes(Model model, Input input);

/// Machine name of an input or model ("water", "peplinski"), as plan files and the catalogue spell them.
std::string_view key_of(Input input);
std::string_view key_of(Model model);
/// Legal range of an input, for clamping and for forms.
Range legal_range(Input input);

}  // namespace gg

#pragma once
/// The published permittivity models behind permittivity(): one source file each. Inputs are finite and within
/// legal_range(); temperature in degrees Celsius, frequency in Hz, > 0. Results are raw: permittivity() clamps them.
#include "wave/material.hpp"

namespace gg::models {

/// eps'' that a conductivity (S/m) adds at a frequency: sigma / (w eps0), exact where P.2040 prints 17.98 sigma /
/// f_GHz.
double conduction_loss(double conductivity, double frequency);

/// ITU-R P.2040-3 (08/2023) and -4 (09/2025), table 3: eps' = a f^b, sigma = c f^d in S/m, f in GHz. Both revisions
/// hold the same rows in the lowest band. The bands are indicative except the grounds' 1 to 10 GHz; below them the
/// power laws go on.
Permittivity building(const std::array<double, 4>& coefficients, double frequency);

/// Pure water, ITU-R P.527-6 (09/2021) eqs 5-13, -4 to 40 C, up to 1 THz. Outside, the nearest temperature is used and
/// flagged Issue::outside_band: the fits are polynomials and leave physics quickly.
Permittivity pure_water(double temperature, double frequency);

/// Fresh to sea water, ITU-R P.527-6 eqs 14-27, salinity 0 to 40 g/kg, temperature as pure_water().
/// The T^3 coefficient of the relaxation fit has a minus sign here, where P.527-6 prints plus: with plus the relaxation
/// frequency rises by 23 % at 20 C and 35 g/kg, against 3 % (minus) and 7 % (the older P.527-4 fit).
Permittivity salt_water(double temperature, double salinity, double frequency);
/// Conductivity of sea water, S/m, same source.
double salt_water_conductivity(double temperature, double salinity);

/// Pure ice, ITU-R P.527-6 eqs 28-34, -60 to 0 C; above 0 C the value at 0 C, flagged Issue::outside_band.
Permittivity pure_ice(double temperature, double frequency);
/// Dry snow, ITU-R P.527-6 eqs 51-53. @param density  kg/m3, up to that of ice (916); above, ice's, flagged.
Permittivity dry_snow(double density, double temperature, double frequency);

/// Topp, Davis & Annan 1980, Water Resources Research 16(3) 574-582: K = 3.03 + 9.3 th + 146 th^2 - 76.7 th^3, 20 MHz
/// to 1 GHz, mineral soils; standard error about 0.013 m3/m3 (from memory). Has no loss: that comes from the
/// conductivity.
/// @param water  m3/m3; above 0.55 flagged Issue::outside_band
Permittivity topp(double water, double conductivity, double frequency);
/// The paper's own inverse, a separate fit and no exact inverse (up to 0.03 m3/m3 apart near dry).
/// @return water content, m3/m3, for a relative permittivity 3 to 40
double topp_water(double permittivity);

/// Grain density that the soil models take where none is given, g/cm3 (P.527's sandy loam; quartz is 2.65).
constexpr double grain_density = 2.66;

/// Free water as Peplinski 1995 takes it: static permittivity and 2 pi tau in s.
struct FreeWater {
    double still, relaxation;
};
/// 0 to 40 C; source as in peplinski().
FreeWater free_water(double temperature);

struct Soil {
    double water;                  ///< m3/m3
    double sand, clay;             ///< mass fractions
    double density;                ///< g/cm3, dry bulk
    double grain = grain_density;  ///< g/cm3
};
/// Peplinski, Ulaby & Dobson 1995, IEEE TGRS 33(3) 803-807, with the correction 33(6) 1340 (the "-1" of eps_s^alpha -
/// 1, absent as first printed); 0.3 to 1.3 GHz; texture in fractions. Carried on outside by the same formulas, flagged
/// by band.
Permittivity peplinski(const Soil& soil, FreeWater water, double frequency);
/// The real part before that paper's linear step 1.15 eps' - 0.68.
double peplinski_unadjusted(const Soil& soil, FreeWater water, double frequency);

/// ITU-R P.527-6 soil, eqs 56-70, texture in percent in the paper. The clay term of sigma1 keeps the minus sign printed
/// there, against the plus of Peplinski 1995: clay-rich soil comes out less lossy than by peplinski(). For clay-rich,
/// dry soil the free-water part turns negative: it is then taken as zero and flagged Issue::model_fails. `soil.density`
/// is not used: the model has its own, p527_density().
Permittivity soil_p527(const Soil& soil, double temperature, double frequency);
/// Dry bulk density by texture, g/cm3, same source.
double p527_density(double sand, double clay);

/// CRIM (complex refractive index) mixing of grains, P.527 water and air; Archie's 1942 law, with exponent 2 on the
/// saturation and a = 1, adds the conductivity: sigma = sigma_w phi^m S^2. Clay's surface conduction is not in it.
struct Pores {
    double porosity, saturation, grain, temperature, pore_conductivity, cementation;
};
Permittivity mixture(const Pores& pores, double frequency);
/// The mixing alone, complex water given.
Complex crim(double porosity, double saturation, Complex grain, Complex water);
/// S/m.
double archie(double pore_conductivity, double porosity, double saturation, double cementation);

}  // namespace gg::models

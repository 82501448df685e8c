#pragma once
/// A uniform plane wave in a lossy medium: exact, no low-loss shortcut.
#include "wave/material.hpp"

namespace gg {

struct PlaneWave {
    double speed = 0.0;        ///< phase speed, m/s
    double wavelength = 0.0;   ///< m
    double attenuation = 0.0;  ///< of the amplitude, Np/m, >= 0
    double skin_depth = 0.0;   ///< m, 1/attenuation; 1e9 where there is no loss
    Complex wavenumber;        ///< 1/m, Im <= 0
    Complex impedance;         ///< ohm
    Issue issue = Issue::none;

    double attenuation_db() const { return attenuation * decibel_per_neper; }  ///< dB/m
};

/// @param frequency  Hz, > 0.  Source: textbook; checked against P.2040 and Davis & Annan tables in tests/wave.
PlaneWave plane_wave(const Material& material, double frequency);
PlaneWave plane_wave(Permittivity permittivity, double frequency);

/// Its wavenumber alone, for many frequencies.  @param frequency  Hz, > 0 and finite
Complex wavenumber(const Material& material, double frequency);

/// The named comparison, not used elsewhere: 1636.12 sigma / sqrt(eps') dB/m, sigma in S/m.
double low_loss_attenuation_db(double conductivity, double permittivity);

/// Reflection of a plane wave from medium 1 on medium 2 at incidence angle (rad, 0 to pi/2 in medium 1).
struct Fresnel {
    Complex te;  ///< electric field across the plane of incidence
    Complex tm;  ///< magnetic field convention: opposite sign to te at normal incidence
};
Fresnel fresnel(Complex permittivity1, Complex permittivity2, double angle);

/// Reflection and transmission of a slab of `thickness` m between two media; exact, multiple echoes included.
/// Transmission is the ratio of the electric field for te and of the magnetic field for tm. Input that is not finite
/// gives zeros.
struct SlabEcho {
    Fresnel reflection, transmission;
};
SlabEcho slab(Complex above, Complex inside, Complex below, double thickness, double frequency, double angle);

}  // namespace gg

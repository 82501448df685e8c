#pragma once
/// Plane waves in the layers, one for each horizontal wave number: what the source sends into the targets' layer, and
/// what the boundaries above and below it send back.
#include <vector>

#include "echo/fast_complex.hpp"
#include "echo/media.hpp"

namespace gg {

/// Where the targets' layer lies.
struct Host {
    int layer = 1;           ///< index in Media::ground, >= 1
    double top = 0.0;        ///< m
    double thickness = 0.0;  ///< m; 0: goes down without end
    bool endless() const { return !(thickness > 0.0); }
};

/// Values at kx = i * spacing, i = 0 .. size - 1; all are even in kx.
struct Spectra {
    double spacing = 0.0;     ///< 1/m
    Cx k;                     ///< wave number of the host layer
    std::vector<Cx> kz;       ///< vertical wave number in the host layer, Im <= 0
    std::vector<Cx> down;     ///< down-going wave at the host's top, per unit source and dkx
    std::vector<Cx> above;    ///< reflection looking up, at the host's top
    std::vector<Cx> below;    ///< reflection looking down, at the host's bottom; 0 when endless
    std::vector<Cx> pass;     ///< once through the host layer; 0 when endless
    std::vector<Cx> surface;  ///< reflection of the air on the uppermost layer alone
    std::vector<Cx> echo;     ///< what the deeper boundaries add to it
    std::vector<Cx> kz_air;
    std::size_t size() const { return kz.size(); }
};

/// Recursive (Airy) forms, exact for plane waves; only decaying exponentials occur.
Spectra spectra_of(const Media& media, const Stack& ground, const Host& host, double height, Polarisation polarisation,
                   double spacing, int count);

}  // namespace gg

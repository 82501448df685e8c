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

/// One plane wave through all media, air first. Recursive (Airy) forms, exact; only decaying exponentials occur.
class PlaneWaves {
  public:
    PlaneWaves(const Media& media, const Stack& ground, Polarisation polarisation);
    /// Turns to a horizontal wave number, 1/m.
    void turn_to(double kx);

    std::vector<Cx> kz;    ///< vertical wave number, Im <= 0
    std::vector<Cx> r;     ///< reflection of medium i on the next, by itself
    std::vector<Cx> once;  ///< once through medium i; the first and the last have no end
    std::vector<Cx> D;     ///< reflection looking down at the bottom of medium i, all below it included
    std::vector<Cx> x;     ///< the same seen from the top of medium i

  private:
    const Stack& ground_;
    std::vector<Cx> k2_, weight_, g_;  // g: kz (along) or kz / permittivity (across), whose ratios make r
};

/// Values at kx = i * spacing, i = 0 .. size - 1; all are even in kx.
struct Spectra {
    double spacing = 0.0;   ///< 1/m
    Cx k;                   ///< wave number of the host layer
    std::vector<Cx> kz;     ///< vertical wave number in the host layer, Im <= 0
    std::vector<Cx> down;   ///< down-going wave at the host's top, per unit source and dkx
    std::vector<Cx> above;  ///< reflection looking up, at the host's top
    std::vector<Cx> below;  ///< reflection looking down, at the host's bottom; 0 when endless
    std::vector<Cx> pass;   ///< once through the host layer; 0 when endless
    std::size_t size() const { return kz.size(); }
};

Spectra spectra_of(const Media& media, const Stack& ground, const Host& host, double height, Polarisation polarisation,
                   double spacing, int count);

}  // namespace gg

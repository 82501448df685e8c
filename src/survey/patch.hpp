#pragma once
/// The patch of ground that one trace sees at a depth.
#include "survey/parts.hpp"

namespace gg {

/// Half-widths of the first Fresnel zone at the bottom of `path`: two-way path longer by half a period at `frequency`
/// than the shortest one, transmitter and receiver `separation` apart along the line. Exact for flat layers; a circle
/// when separation is 0, else longer along the line than across it.
Patch lit_patch(const Path& path, double separation, double frequency);

/// Radius by straight rays in one layer, sqrt(lambda d/2 + lambda^2/16). Lengths in m, > 0, else 0.
double fresnel_rule(double depth, double wavelength);
/// Long radius of the published footprint, lambda/4 + d/sqrt(K+1) (Annan & Cosway 1992, from memory). The short is
/// half.
double footprint_rule(double depth, double wavelength, double permittivity);

}  // namespace gg

#pragma once
/// The wave from transmitter to receiver through the air and along the surface, at one frequency.
#include "echo/media.hpp"

namespace gg {

/// Field at the receiver per unit source over a half-space of the uppermost layer's ground.
/// @param separation  m, > 0 (a line source's own field at its own place has no end)
/// The free wave in closed form, the surface's share as an integral over kx: along the real axis between the branch
/// points with sine-squared maps that take their square roots out, from there straight down the complex plane, where
/// exp(-j kx s) dies away (or on along the axis where the antenna's height damps it sooner). 1e-5 of the free wave.
Complex direct_wave(const Media& media, double separation, double height, Polarisation polarisation);

}  // namespace gg

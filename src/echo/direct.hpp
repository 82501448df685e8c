#pragma once
/// The wave from transmitter to receiver through the air and along the surface, at one frequency.
#include "echo/media.hpp"

namespace gg {

/// Field at the receiver per unit source over a half-space of the uppermost layer's ground.
/// @param separation  m, > 0 (a line source's own field at its own place has no end)
/// The free wave in closed form, the surface's share as an integral over kx whose slow tail is taken out in closed form
/// (static image); each piece between branch points runs over a sine-squared map that takes their square roots out.
/// 1e-4.
Complex direct_wave(const Media& media, double separation, double height, Polarisation polarisation);

}  // namespace gg

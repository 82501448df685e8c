#pragma once
/// The colours of a section: our own scale, from one sign of the wave over nothing to the other.
#include "draw/canvas.hpp"

namespace gg {

/// Colour of a strength from -1 to 1, others held to that; NaN is as 0.
/// Two straight lines in CIELAB (CIE 1976 L*a*b*, D65) from the paper's tone to a blue and to an orange of equal
/// lightness and chroma: equal steps in strength are equal steps to the eye, strength alone is read from the lightness,
/// and the sign from blue against orange, which red-green blind eyes keep apart. Nothing is cut off at the screen's
/// gamut.
Colour shade(double strength, bool dark);

}  // namespace gg

#pragma once
/// Small pictures inside SVG files.
#include <span>
#include <string>

#include "draw/canvas.hpp"

namespace gg {

/// A PNG file (ISO/IEC 15948) of 8-bit RGBA pixels, row by row, as a "data:image/png;base64," address. Stored, not
/// compressed: the heat maps are small, and the file needs no library. Empty when the sizes do not fit the pixels.
std::string png_address(int columns, int rows, std::span<const Colour> pixels);

}  // namespace gg

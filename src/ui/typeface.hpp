#pragma once
/// The font atlas: the program's one typeface at the few sizes a screen uses, whole device pixels each.
#include <string_view>
#include <vector>

struct ImFont;

namespace gg {

/// An em of DejaVu Sans is this much less than the ascent-to-descent box that Dear ImGui calls the size
/// ((ascent - descent) / units per em, from the font's own header).
constexpr double box_per_em = 1.164;

/// Builds the atlas of the current ImGui context for these css sizes (em) at `pixel_ratio`. Not inside a frame.
/// @param font  TTF bytes, kept alive by the caller
void build_typeface(std::string_view font, const std::vector<double>& sizes, double pixel_ratio);

/// The built font nearest above `pixels` (device px, box size), else the largest.
ImFont* font_for(double pixels);

}  // namespace gg

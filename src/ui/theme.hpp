#pragma once
/// The look of what Dear ImGui draws itself: text fields and their selection. Everything else is drawn by Screen.
#include "draw/palette.hpp"

namespace gg {

void apply_theme(const Palette& colours, double pixel_ratio);

}  // namespace gg

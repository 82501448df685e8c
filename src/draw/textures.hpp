#pragma once
/// What a layer is drawn with, so that layers are told apart without colour: our own drawings, one for each Texture.
#include "draw/canvas.hpp"
#include "wave/catalogue.hpp"

namespace gg {

constexpr int most_texture_marks = 400;  ///< primitives a layer

/// Fills `box` with marks that stand still in the ground: cells counted from `anchor`, the screen place of one point of
/// the ground. The same ground gives the same marks. Cells come in few fixed sizes, chosen by the box's area to keep
/// within `most_texture_marks`, so that marks do not crawl while a boundary is dragged.
void draw_texture(Canvas& canvas, Box box, Point anchor, Texture texture, Colour marks);

}  // namespace gg

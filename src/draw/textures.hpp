#pragma once
/// What a layer is drawn with, so that layers are told apart without colour: our own drawings, one for each Texture.
#include "draw/canvas.hpp"
#include "wave/catalogue.hpp"

namespace gg {

/// Fills `box` with marks that stand still in the ground: cells of `pitch` css px counted from `anchor`, the screen
/// place of one point of the ground. The same ground gives the same marks. At most `most_texture_marks` primitives,
/// then it stops.
void draw_texture(Canvas& canvas, Box box, Point anchor, double pitch, Texture texture, Colour marks);

/// Pitch that keeps a picture of that area within the number of marks, in few fixed sizes so that marks do not crawl
/// while a boundary is dragged.
double texture_pitch(Box picture);

constexpr int most_texture_marks = 400;

}  // namespace gg

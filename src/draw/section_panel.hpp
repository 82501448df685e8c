#pragma once
/// The section as a picture inside Pair: traces as recorded, or the focused image.
#include "draw/figure.hpp"

namespace gg {

/// A box of the picture with its two axes.
struct SectionFrame {
    Box box;
    double from = 0.0, to = 1.0;     ///< m along the line
    double first = 0.0, last = 1.0;  ///< s, or m of depth
    double x(double position) const { return box.x + (position - from) / (to - from) * box.width; }
    double y(double value) const { return box.y + (value - first) / (last - first) * box.height; }
};

/// Every trace as wide as the step and in the colours of shade(), joined up from sample to sample; nothing is drawn
/// past the line's or the window's end. The strongest echo of a target in the frame has the full colour.
void draw_record(Canvas& canvas, const SectionFrame& frame, const PairSection& pair, const SectionLook& look,
                 bool dark);
/// The same of the focused image, down to the frame's last depth.
void draw_focused(Canvas& canvas, const SectionFrame& frame, const PairSection& pair, const SectionLook& look,
                  bool dark);
/// The travel times of each target over the record.
void draw_travel_times(Canvas& canvas, const SectionFrame& frame, const PairSection& pair, Colour colour);

}  // namespace gg

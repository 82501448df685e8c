#pragma once
/// Colours of the two themes; text at 7:1 or more on `paper`, marks at 3:1 or more.
#include "draw/canvas.hpp"
#include "survey/answers.hpp"

namespace gg {

struct Palette {
    bool dark = false;
    Colour paper, panel, hairline;  ///< page, raised panel, rules
    Colour ink, soft_ink;           ///< text, lesser text (still 7:1)
    Colour wave;                    ///< the one accent: the wave, and what can be touched
    Colour wave_soft;               ///< a pale field of it
    Colour second;                  ///< a second line in one picture (sent against returned)
    Colour warn;                    ///< errors and gaps
    Colour earth[8];                ///< tints of layers, from the top
    Colour earth_mark;              ///< the texture's marks
};
const Palette& palette(bool dark);

/// Our grade sign: filled, half, hollow disc in `colour`.
void grade_sign(Canvas& canvas, Point centre, double radius, Grade grade, Colour colour);

}  // namespace gg

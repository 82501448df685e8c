#pragma once
/// Where the parts of the screen stand, css px; a pure function of the surface and the size of its text.
#include "draw/canvas.hpp"
#include "ui/program.hpp"

namespace gg {

struct Areas {
    enum class Kind : std::uint8_t { phone, phone_side, tablet, desktop };
    Kind kind = Kind::phone;
    Box whole;                                                  ///< inside the safe areas
    Box header, strip, picture, tabs, inputs, answers, footer;  ///< width and height 0 where that part is not shown
    double row = 48;                                            ///< height of an input row
    double margin = 12;                                         ///< between a part's edge and its content
};

/// @param text  css px of normal text (16 unless the person wants larger)
Areas areas_for(const Surface& surface, double text);

}  // namespace gg

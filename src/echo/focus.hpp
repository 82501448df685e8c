#pragma once
/// Focusing: folds the hyperbolas of a section back to where they came from, as an office would do it before drawing a
/// map.
#include <vector>

#include "echo/scene.hpp"

namespace gg {

struct Depths {
    double from = 0.0, to = 1e9;  ///< m below the surface
};

/// A picture of the ground below the line, 1 where it is strongest (all 0 when the record is).
struct Image {
    int traces = 0, rows = 0;
    double first = 0.0, step = 0.0;  ///< m along the line
    double top = 0.0;                ///< m, depth of row 0
    double spacing = 0.0;            ///< m in depth from row to row
    std::vector<double> values;      ///< traces x rows, column after column
    double peak = 0.0;               ///< strongest value before it was made 1, in the record's unit
    Issue issue = Issue::none;       ///< not none: the arrays are empty

    double at(int trace, int row) const {
        return values[static_cast<std::size_t>(trace) * static_cast<std::size_t>(rows) + static_cast<std::size_t>(row)];
    }
};

/// @param scene   ground as it is believed to be, antenna and sampling of the record
/// @param record  traces x samples, trace after trace: a Section's targets, with noise or without
/// @param depths  m, where the picture may begin and end, if the record does not end it sooner
/// Phase-shift migration (Gazdag 1978, Geophysics 43(7), from memory), exploding reflectors: every layer at half its
/// speed at the centre frequency, its phase undone layer by layer, so refraction at each boundary is followed and no
/// travel times are searched; chosen over Stolt's map and Kirchhoff's sum because it is exact for flat layers at the
/// same price. Attenuation is left as recorded. Transmitter and receiver apart are first moved together: t^2 -
/// (separation / speed)^2, speed the mean one down to there. A wrong ground gives a wrong depth and a smile or a frown,
/// as in the field.
Image focused(const Scene& scene, const std::vector<double>& record, Depths depths = {});

}  // namespace gg

#include <algorithm>
#include <cmath>

#include "draw/figure.hpp"
#include "wave/constants.hpp"

namespace gg {

double dragged(const Handle& handle, Point from, Point to) {
    double value = handle.start;
    if (handle.way == Handle::Way::round) {
        const double turn = handle.turn > 0 ? handle.turn : 2 * pi;
        const double dx = to.x - handle.pivot.x, dy = to.y - handle.pivot.y;
        if (dx != 0.0 || dy != 0.0) value = std::atan2(dx, -dy);
        value -= turn * std::floor(value / turn);
    } else {
        const double moved = handle.way == Handle::Way::across ? to.x - from.x : to.y - from.y;
        const double change = handle.per_px * moved;
        if (handle.inverse && handle.start != 0.0) {
            // 1/value goes evenly; a pull past nothing stops at twenty times the start.
            value = handle.start / std::max(0.05, 1 - change / handle.start);
        } else {
            value = handle.start + change;
        }
    }
    if (handle.snap > 0) value = handle.snap * std::round(value / handle.snap);
    return std::isfinite(value) ? value : handle.start;
}

const std::vector<ViewRow>& views() {
    static const std::vector<ViewRow> rows{
        {View::beam,
         "beam",
         "Beam",
         "The cut through the ground, to true scale",
         beam_figure,
         {"target.depth", "target.size", "antenna.frequency", "ground.0.thickness", "target.gap", "antenna.height"},
         {"patch.along", "smallest", "apart.sideways", "target.loss"}},
        {View::pulse,
         "pulse",
         "Pulse",
         "The wavelet sent, returned and as sampled",
         pulse_figure,
         {"pass.samples", "pass.window", "antenna.frequency", "target.depth"},
         {"pass.interval", "pass.window", "pass.error", "apart.down"}},
        {View::pair,
         "pair",
         "Pair",
         "Two neighbours, and the gap at which they part",
         pair_figure,
         {"target.gap", "target.depth", "antenna.frequency", "pass.step"},
         {"apart.sideways", "apart.down", "patch.along", "pass.step"}},
        {View::lanes,
         "lanes",
         "Lanes",
         "The site from above: lines, hits and misses",
         lanes_figure,
         {"lanes.spacing", "target.bearing", "lanes.bearing", "target.length"},
         {"lanes.hits", "lanes.between_hits", "lanes.picture", "lanes.swath"}}};
    return rows;
}

}  // namespace gg

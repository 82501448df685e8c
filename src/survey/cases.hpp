#pragma once
/// The unknown as a few whole grounds: every answer is computed in each, and its low and high are the ends found.
#include <memory>
#include <vector>

#include "survey/echo_pulse.hpp"
#include "survey/path.hpp"
#include "survey/plan.hpp"

namespace gg {

/// One possible ground with the wave in each layer at the antenna's centre frequency.
struct Ground {
    Stack stack;
    std::vector<PlaneWave> waves;
    PathSpectrum spectrum;  ///< wavenumbers over the sent band, shared by all depths
};

/// One ground and one depth to the target's top.
struct Case {
    const Ground* ground = nullptr;
    double depth = 0.0;       ///< m
    double height = 0.0;      ///< m, antenna above the surface
    double separation = 0.0;  ///< m
    int layer = 0;            ///< the one that holds the target
    Path path;                ///< antenna to the target's top
    EchoPulse echo;           ///< what a reflector there gives back

    const PlaneWave& wave() const { return ground->waves[layer]; }
    /// Layers from the antenna to any depth below the surface.
    Path path_to(double z) const;
    /// Two-way time of the target's top straight below the middle of the antenna, s.
    double arrival() const;
    /// depth / one-way time, of the ground alone: the speed a one-layer reading finds.
    double mean_speed() const;
};

struct Cases {
    std::vector<std::unique_ptr<Ground>>
        grounds;            ///< likely, then those of fastest, slowest, clearest, lossiest that differ
    std::vector<Case> all;  ///< the first one is the likely ground at the likely depth
    const Case& likely() const { return all.front(); }
};

/// Corner search: for each layer the ends of its inputs that make it fastest, slowest, clearest and lossiest at the
/// centre frequency, all together; the depth at the end that widens the answer on either side.
/// @param plan  sane (see make_sane)
Cases cases_of(const Plan& plan);

}  // namespace gg

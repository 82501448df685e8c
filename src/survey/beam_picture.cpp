#include <algorithm>
#include <cmath>

#include "survey/parts.hpp"

namespace gg {
namespace {

constexpr int fan = 33, most_arcs = 40;
constexpr double widest = 75.0 * pi / 180.0;

/// One ray of the fan, stepped on by equal times; it dies where a faster layer turns it back.
struct Runner {
    double x = 0.0, depth = 0.0, slowness = 0.0;
    std::size_t layer = 0;
    bool alive = true;
};

}  // namespace

void draw_beam(const Setting& setting, const Patch& patch, Answers& answers) {
    BeamPicture& beam = answers.beam;
    const Case& c = setting.likely();
    const Plan& plan = setting.plan;
    const double f = setting.frequency();
    beam.patch_along = patch.along;
    beam.patch_across = patch.across;
    beam.wavelength_at_target = c.wave().wavelength;
    const double bottom = std::max(plan.target.depth.high + plan.target.size, plan.need.deepest);
    beam.max_depth = 1.25 * bottom + 0.5 * c.wave().wavelength;
    for (double side : {-1.0, 1.0}) {
        beam.edge.push_back(ray_to(c.ground->stack, c.height, side * patch.along, c.depth, f));
    }

    const auto& waves = c.ground->waves;
    const auto& slabs = c.ground->stack.slabs;
    const std::size_t layers = waves.size();
    // Boundaries below the antenna, air first where it is lifted.
    std::vector<double> speed, floor;
    if (c.height > 0.0) speed.push_back(speed_of_light), floor.push_back(0.0);
    double z = 0.0;
    for (std::size_t i = 0; i < layers; ++i) {
        z += slabs[i].thickness;
        speed.push_back(waves[i].speed);
        floor.push_back(i + 1 == layers ? 1e300 : z);
    }
    Runner runners[fan];
    for (int i = 0; i < fan; ++i) {
        const double angle = widest * (2.0 * i / (fan - 1) - 1.0);
        runners[i].depth = -c.height;
        runners[i].slowness = std::sin(angle) / speed[0];
    }
    const double to_bottom = c.path_to(beam.max_depth).time_down();
    // One period apart; where that would be more arcs than can be drawn, every second, third ... of them.
    const double every = std::max(1.0, std::ceil(to_bottom * f / most_arcs));
    const int arcs = std::min(most_arcs, static_cast<int>(to_bottom * f / every));
    for (int n = 0; n < arcs; ++n) {
        BeamPicture::Arc arc;
        for (Runner& r : runners) {
            double left = every / f;
            while (r.alive && left > 0.0) {
                const double v = speed[r.layer], sine = r.slowness * v;
                if (!(std::abs(sine) < 1.0)) {
                    r.alive = false;
                    break;
                }
                const double cosine = std::sqrt(1.0 - sine * sine);
                const double t = std::min(left, (floor[r.layer] - r.depth) / (v * cosine));
                const bool crosses = t < left;
                r.x += t * v * sine;
                r.depth = crosses ? floor[r.layer] : r.depth + t * v * cosine;
                left -= t;
                if (crosses) ++r.layer;
            }
            if (r.alive) arc.points.push_back({r.x, r.depth});
        }
        if (arc.points.size() > 1) beam.arcs.push_back(std::move(arc));
    }
}

}  // namespace gg

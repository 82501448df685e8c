#pragma once
/// A stack of flat layers over a half-space: travel times and refracted paths.
#include <vector>

#include "wave/plane_wave.hpp"

namespace gg {

struct Slab {
    Material material;
    double thickness = 0.0;  ///< m, > 0; of the last one ignored: it goes down without end
    bool operator==(const Slab&) const = default;
};

struct Stack {
    std::vector<Slab> slabs;  ///< from the surface down, at least one
    bool operator==(const Stack&) const = default;
};

/// Index of the layer that holds `depth` (m, >= 0); a depth on a boundary belongs to the layer above it.
int layer_at(const Stack& stack, double depth);
/// Depth of the top of layer `index`, m.
double top_of(const Stack& stack, int index);

/// Phase speeds of each layer at one frequency, m/s: what the path functions below work on.
std::vector<double> speeds(const Stack& stack, double frequency);

/// One-way travel time straight down to `depth`, s.
Value time_down(const Stack& stack, double depth, double frequency);
/// Depth reached by a wave that goes straight down for `time` s.
Value depth_after(const Stack& stack, double time, double frequency);
/// depth / time_down: the speed a single-layer reading of the data would find.
Value effective_speed(const Stack& stack, double depth, double frequency);

struct Crossing {
    double x = 0.0, depth = 0.0;  ///< m, from the antenna
};
struct Ray {
    std::vector<Crossing> points;  ///< start, each boundary crossed, end
    double time = 0.0;             ///< s, one way
    double slowness = 0.0;         ///< horizontal, s/m: Snell's constant along the ray
    double length = 0.0;           ///< m
    Issue issue = Issue::none;
};

/// Fastest (Snell) path from an antenna at (0, -height) to (offset, depth).
/// @param height  m, >= 0 above the surface, through air
/// Exact to 1e-12 of the travel time for layers; not the air wave or head waves.
Ray ray_to(const Stack& stack, double height, double offset, double depth, double frequency);

}  // namespace gg

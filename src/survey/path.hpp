#pragma once
/// Travel times through flat layers, fast enough for thousands a plan: speeds are given, nothing is allocated.
/// wave's ray_to() does the same from materials and gives the whole ray; tests hold the two against each other.
#include <array>
#include <cmath>

#include "wave/result.hpp"

namespace gg {

/// Layers crossed from the antenna down to one depth.
struct Path {
    static constexpr int most = 10;                 ///< eight layers, the air under a lifted antenna, one to spare
    std::array<double, most> speed{}, thickness{};  ///< m/s, m
    int count = 0;

    /// Adds a layer at the bottom; one thinner than a micrometre adds nothing.
    void add(double v, double h);
    /// One-way time straight down, s.
    double time_down() const;
    double depth() const;
};

struct Leg {
    double time = 0.0;     ///< s, one way
    double angle = 0.0;    ///< rad from the vertical at the lower end, >= 0
    double tangent = 0.0;  ///< of the angle in the fastest layer, >= 0
};

/// Fastest path to a horizontal offset (m, either sign) at the bottom of `path`. Newton on the tangent of the angle in
/// the fastest layer: the offset is concave in it, so that the iteration runs up to the root and cannot overshoot.
/// @param near  that tangent in a leg much like this one, >= 0: saves a step or two; from beyond the root the first
/// step
///              comes back to its near side
Leg leg_to(const Path& path, double offset, double near = 0.0);

/// Offset (>= 0) at which `later(offset)`, which rises from 0, reaches `goal`, to 1e-9 of the goal or 1e-6 of itself.
/// @param start  m, > 0, first guess
template <class F>
double offset_where(F later, double goal, double start) {
    double near = 0.0, far = start;
    int side = 0;  // of the root, that the last step fell on
    double f_near = -goal, f_far = later(far) - goal;
    for (int i = 0; i < 60 && !(f_far >= 0.0); ++i) far *= 2.0, f_far = later(far) - goal;
    for (int i = 0; i < 60 && far - near > 1e-6 * far; ++i) {
        // Regula falsi in the square of the offset, where a hyperbola is nearly straight; an end that stays put twice
        // counts half, or the search would stall (Illinois).
        const double a = near * near, b = far * far;
        double x = std::sqrt(a + (b - a) * (-f_near) / (f_far - f_near));
        if (!(x > near && x < far)) x = 0.5 * (near + far);
        const double f = later(x) - goal;
        if (f >= 0.0) {
            far = x, f_far = f;
            if (side > 0) f_near *= 0.5;
            side = 1;
        } else {
            near = x, f_near = f;
            if (side < 0) f_far *= 0.5;
            side = -1;
        }
        if (std::abs(f) < 1e-9 * goal) return x;
    }
    return 0.5 * (near + far);
}

}  // namespace gg

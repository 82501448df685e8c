#pragma once
/// Grounds and plans that several survey tests start from.
#include "survey/cases.hpp"
#include "survey/plan.hpp"

namespace gg {

inline Layer own_layer(double permittivity, double conductivity, double thickness) {
    Layer layer;
    layer.matter = matter_of("own");
    layer.matter.inputs[Input::permittivity] = exactly(permittivity);
    layer.matter.inputs[Input::conductivity] = exactly(conductivity);
    layer.thickness = exactly(thickness);
    return layer;
}

/// One layer without loss in which the wave runs at `speed` m/s.
inline Plan one_layer(double speed, double depth, double size, double frequency) {
    Plan plan;
    const double n = speed_of_light / speed;
    plan.ground = {own_layer(n * n, 0.0, 100.0)};
    plan.target.depth = exactly(depth);
    plan.target.size = size;
    plan.antenna.pulse.centre_frequency = frequency;
    plan.antenna.separation = 0.0;
    return plan;
}

/// Three layers, the middle one slow, with some loss; ranges on all of it.
inline Plan three_layers() {
    Plan plan;
    plan.ground = {own_layer(5.0, 0.001, 0.3), own_layer(12.0, 0.01, 0.4), own_layer(20.0, 0.02, 1.0)};
    plan.ground[0].matter.inputs[Input::permittivity] = {4.0, 5.0, 6.0};
    plan.ground[1].matter.inputs[Input::permittivity] = {9.0, 12.0, 16.0};
    plan.ground[1].matter.inputs[Input::conductivity] = {0.005, 0.01, 0.03};
    plan.ground[1].thickness = {0.3, 0.4, 0.5};
    plan.target.depth = {0.8, 0.9, 1.1};
    plan.target.bearing = 0.5;
    return plan;
}

}  // namespace gg

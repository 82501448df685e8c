#pragma once
/// What everything in a scene is made of at one complex frequency w - j delta.
#include "echo/scatterer.hpp"

namespace gg {

struct Media {
    Complex w;                        ///< rad/s, Im = -delta
    std::vector<Inner> ground;        ///< air first, then the layers from the top
    std::vector<Cylinder> cylinders;  ///< in the scene's order
};

/// Materials are known on the real frequency axis. Off it, w eps(w), which is smooth down to w = 0 (there it is the
/// conduction term alone), is carried on by its first two central differences of step delta: exact for constant
/// permittivity with conductivity, and for the catalogue's dispersive models good to the third order of delta over
/// their relaxation frequencies.
Media media_at(const Scene& scene, double w, double delta);

}  // namespace gg

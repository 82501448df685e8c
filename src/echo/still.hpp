#pragma once
/// What is the same at all positions: the direct wave and the boundaries' own echoes.
#include <vector>

#include "echo/scene.hpp"

namespace gg {

/// Through the air and off the surface; one trace, see Section.
std::vector<double> direct_of(const Scene& scene, double care);
/// Echoes of the boundaries below the surface; one trace.
std::vector<double> layers_of(const Scene& scene, double care);

}  // namespace gg

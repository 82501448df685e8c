#pragma once
/// What is the same at all positions: the direct wave and the boundaries' own echoes.
#include <vector>

#include "echo/scene.hpp"

namespace gg {

struct Still {
    std::vector<double> layers, direct;  ///< one trace each, see Section
};
Still still_of(const Scene& scene, double care);

}  // namespace gg

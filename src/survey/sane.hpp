#pragma once
/// A plan made safe to compute with: what is out of range is moved to the nearest value that is in it, and told.
#include <string>

#include "survey/plan.hpp"

namespace gg {

struct Sane {
    Plan plan;
    /// First sentence of what had to be moved in each part; empty where nothing had to be.
    std::string ground, target, antenna, pass, lanes, need;
};

/// Never fails: any bit pattern in, a plan with 1 to 8 layers, finite numbers and ordered ranges out.
Sane make_sane(const Plan& plan);

}  // namespace gg

#pragma once
#include <cstdint>
#include <vector>

#include "echo/scene.hpp"

namespace gg {

/// `count` independent normal numbers of root mean square `rms`, the same on every platform for the same seed.
/// Generator: splitmix64 (Steele, Lea & Flood 2014), ziggurat (Marsaglia & Tsang 2000, 256 layers), both from memory.
std::vector<double> white_noise(std::size_t count, double rms, std::uint64_t seed);

/// Root mean square of the noise in the scene's record, see NoiseFloor: it goes by the direct wave's own peak, however
/// little of it the record shows.
double noise_level(const Scene& scene);

}  // namespace gg

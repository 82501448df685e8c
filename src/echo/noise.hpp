#pragma once
#include <cstdint>
#include <vector>

namespace gg {

/// `count` independent normal numbers of root mean square `rms`, the same on every platform for the same seed.
/// Generator: splitmix64 (Steele, Lea & Flood 2014), ziggurat (Marsaglia & Tsang 2000, 256 layers), both from memory.
std::vector<double> white_noise(std::size_t count, double rms, std::uint64_t seed);

}  // namespace gg

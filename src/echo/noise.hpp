#pragma once
#include <cstdint>
#include <vector>

namespace gg {

/// `count` independent normal numbers of root mean square `rms`, the same on every platform for the same seed.
/// Generator: splitmix64 (Steele, Lea & Flood 2014, from memory), Box-Muller.
std::vector<double> white_noise(std::size_t count, double rms, std::uint64_t seed);

}  // namespace gg

#include "echo/noise.hpp"

#include <cmath>

#include "wave/constants.hpp"

namespace gg {

std::vector<double> white_noise(std::size_t count, double rms, std::uint64_t seed) {
    const auto uniform = [&seed] {  // in (0, 1)
        std::uint64_t x = seed += 0x9e3779b97f4a7c15ULL;
        x = (x ^ (x >> 30)) * 0xbf58476d1ce4e5b9ULL;
        x = (x ^ (x >> 27)) * 0x94d049bb133111ebULL;
        return (static_cast<double>((x ^ (x >> 31)) >> 11) + 0.5) * 0x1p-53;
    };
    std::vector<double> out(count + (count & 1));
    for (std::size_t i = 0; i < out.size(); i += 2) {
        const double size = rms * std::sqrt(-2.0 * std::log(uniform())), angle = 2.0 * pi * uniform();
        out[i] = size * std::cos(angle);
        out[i + 1] = size * std::sin(angle);
    }
    out.resize(count);
    return out;
}

}  // namespace gg

#include "echo/noise.hpp"

#include <algorithm>
#include <array>
#include <cmath>

#include "echo/recording.hpp"
#include "echo/still.hpp"

namespace gg {
namespace {

/// The ziggurat's layers: the bell cut into `count` pieces of one area, the lowest with the tail past `edge`.
struct Layers {
    static constexpr int count = 256;
    static constexpr double edge = 3.6541528853610088, area = 0.00492867323399;
    std::array<double, count + 1> x{}, y{};  ///< right ends, x[0] as wide as the lowest with its tail; heights there
    Layers() {
        const auto bell = [](double at) { return std::exp(-0.5 * at * at); };
        x[0] = area / bell(edge);
        x[1] = edge;
        for (int i = 2; i < count; ++i) x[i] = std::sqrt(-2.0 * std::log(area / x[i - 1] + bell(x[i - 1])));
        for (int i = 0; i <= count; ++i) y[i] = bell(x[i]);
    }
};

}  // namespace

std::vector<double> white_noise(std::size_t count, double rms, std::uint64_t seed) {
    static const Layers layers;
    const auto bits = [&seed] {
        std::uint64_t z = seed += 0x9e3779b97f4a7c15ULL;
        z = (z ^ (z >> 30)) * 0xbf58476d1ce4e5b9ULL;
        z = (z ^ (z >> 27)) * 0x94d049bb133111ebULL;
        return z ^ (z >> 31);
    };
    const auto unit = [](std::uint64_t b) { return (static_cast<double>(b >> 11) + 0.5) * 0x1p-53; };  // in (0, 1)
    const auto normal = [&] {
        for (;;) {
            const std::uint64_t b = bits();
            const std::size_t i = b & 255;
            const double x = (2.0 * unit(b) - 1.0) * layers.x[i];  // the low bits are not in unit()
            if (std::fabs(x) < layers.x[i + 1]) return x;
            if (i == 0) {
                double past = 0.0, rest = 0.0;
                do {
                    past = -std::log(unit(bits())) / Layers::edge;
                    rest = -std::log(unit(bits()));
                } while (!(2.0 * rest > past * past));
                return std::copysign(Layers::edge + past, x);
            }
            if (layers.y[i] + unit(bits()) * (layers.y[i + 1] - layers.y[i]) < std::exp(-0.5 * x * x)) return x;
        }
    };
    std::vector<double> out(count);
    for (double& value : out) value = rms * normal();
    return out;
}

double noise_level(const Scene& scene) {
    Scene look = scene;
    const double f = scene.pulse.centre_frequency, onset = onset_of(scene.pulse);
    const double speed = std::fmin(speed_of_light, speeds(scene.ground, f).front());
    const double latest = (scene.separation + 2.0 * scene.height) / speed + onset;
    look.sampling.start = -onset;
    look.sampling.window = latest + onset;
    look.sampling.samples = std::clamp(static_cast<int>(24.0 * f * look.sampling.window), 16, 8192);
    double peak = 0.0;
    for (const double value : direct_of(look, 1.0)) peak = std::fmax(peak, std::fabs(value));
    return peak * std::pow(10.0, -scene.noise.dynamic_range / 20.0) / std::sqrt(scene.noise.stacks);
}

}  // namespace gg

#include "draw/shades.hpp"

#include <algorithm>
#include <array>
#include <cmath>

#include "wave/constants.hpp"

namespace gg {
namespace {

struct Scale {
    double nothing, most;       ///< lightness L* at strength 0 and 1
    double chroma;              ///< C*ab at strength 1
    double negative, positive;  ///< hue, degrees
};
constexpr Scale day{97.0, 31.0, 46.0, 285.0, 55.0}, night{9.0, 78.0, 37.0, 240.0, 65.0};

/// From L*a*b* to sRGB (IEC 61966-2-1).
Colour srgb(double lightness, double a, double b) {
    const auto cube = [](double t) { return t > 6.0 / 29 ? t * t * t : 3 * 36.0 / 841 * (t - 4.0 / 29); };
    const double f = (lightness + 16) / 116, x = 0.95047 * cube(f + a / 500), y = cube(f),
                 z = 1.08883 * cube(f - b / 200);
    const auto byte = [](double linear) {
        const double s = linear <= 0.0031308 ? 12.92 * linear : 1.055 * std::pow(linear, 1 / 2.4) - 0.055;
        return static_cast<std::uint8_t>(std::lround(255 * std::clamp(s, 0.0, 1.0)));
    };
    return {byte(3.2404542 * x - 1.5371385 * y - 0.4985314 * z), byte(-0.9692660 * x + 1.8760108 * y + 0.0415560 * z),
            byte(0.0556434 * x - 0.2040259 * y + 1.0572252 * z), 255};
}

constexpr int steps = 128;  // to either side: as many as 8 bits a channel can tell

std::array<Colour, 2 * steps + 1> table_of(const Scale& scale) {
    std::array<Colour, 2 * steps + 1> out;
    for (int i = -steps; i <= steps; ++i) {
        const double share = std::abs(i) / static_cast<double>(steps), hue = (i < 0 ? scale.negative : scale.positive);
        const double chroma = share * scale.chroma, angle = hue * pi / 180;
        out[static_cast<std::size_t>(i + steps)] = srgb(scale.nothing + share * (scale.most - scale.nothing),
                                                        chroma * std::cos(angle), chroma * std::sin(angle));
    }
    return out;
}

}  // namespace

Colour shade(double strength, bool dark) {
    static const auto light_table = table_of(day), dark_table = table_of(night);
    const double held = strength > -1 ? std::min(strength, 1.0) : strength <= -1 ? -1.0 : 0.0;
    return (dark ? dark_table : light_table)[static_cast<std::size_t>(steps + std::lround(held * steps))];
}

}  // namespace gg

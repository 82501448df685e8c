#include "survey/rebuild.hpp"

#include <algorithm>
#include <cmath>

namespace gg {

double sinc_sum(std::span<const double> values, double place) {
    const double nearest = std::round(place);
    if (std::abs(place - nearest) < 1e-9) {
        const bool outside = nearest < 0.0 || nearest >= static_cast<double>(values.size());
        return outside ? 0.0 : values[static_cast<std::size_t>(nearest)];
    }
    // The sine of sinc is the same for all samples but for its sign, which takes turns: two of them go on one fraction,
    // because divisions are what this costs.
    double sum = 0.0, away = place;
    std::size_t n = 0;
    for (; n + 1 < values.size(); n += 2, away -= 2.0) {
        sum += (values[n] * (away - 1.0) - values[n + 1] * away) / (away * (away - 1.0));
    }
    if (n < values.size()) sum += values[n] / away;
    return std::sin(pi * place) / pi * sum;
}

RebuildError rebuild_error(const EchoPulse& echo, double interval) {
    RebuildError worst;
    if (!(interval > 0.0 && echo.width > 0.0)) return worst;
    const double dt = std::max(interval, echo.width / 40.0);
    const double span = std::min(0.95 * echo.reach, 1.8 * std::max(echo.lead, echo.tail) + 2.0 * dt);
    const int half = std::min(400, static_cast<int>(span / dt) + 1);
    constexpr int phases = 4, places = 32;
    const double from = -1.2 * echo.width, to = 1.2 * echo.width;
    double truth[places + 1];
    for (int k = 0; k <= places; ++k) truth[k] = echo.trace(from + (to - from) * k / places);
    std::vector<double> sample(2 * half + 1);
    for (int phase = 0; phase < phases; ++phase) {
        const double shift = dt * phase / phases;
        for (int i = -half; i <= half; ++i) sample[i + half] = echo.trace(i * dt + shift);
        for (int k = 0; k <= places; ++k) {
            const double place = (from + (to - from) * k / places - shift) / dt;
            const int i = static_cast<int>(std::floor(place));
            if (i < -half || i >= half) continue;
            const double u = place - i;
            const double joined = (1.0 - u) * sample[i + half] + u * sample[i + 1 + half];
            worst.joined = std::max(worst.joined, std::abs(joined - truth[k]));
            worst.band_limited = std::max(worst.band_limited, std::abs(sinc_sum(sample, place + half) - truth[k]));
        }
    }
    return worst;
}

int samples_for(double window, double interval) {
    if (!(window > 0.0 && interval > 0.0)) return 2;
    const double exact = window / interval;
    // 39 ns at 1/3 ns is 117, which plain floating point makes 118.
    return static_cast<int>(std::clamp(std::ceil(exact - 1e-9 * exact), 2.0, 1e9));
}

}  // namespace gg

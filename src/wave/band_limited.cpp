#include <algorithm>

#include "wave/pulse.hpp"

namespace gg {

std::vector<double> band_limited(const Signal& samples, std::span<const double> at) {
    std::vector<double> result(at.size(), 0.0);
    const std::size_t count = samples.values.size();
    if (count == 0 || !(samples.step > 0.0)) return result;
    // The trigonometric polynomial through N even samples is sum x_i sin(pi (u - i)) / (N tan(pi (u - i) / N)), u in
    // steps; its value costs one tangent a sample, or, by the sum rule with tabled sines, one division. Silent samples
    // are skipped.
    const double N = 2.0 * static_cast<double>(count);
    double peak = 0.0;
    for (const double x : samples.values) peak = std::max(peak, std::abs(x));
    struct Term {
        double place, value, sine, cosine;
    };
    std::vector<Term> terms;
    for (std::size_t i = 0; i < count; ++i) {
        const double x = samples.values[i], angle = pi * static_cast<double>(i) / N;
        if (std::abs(x) > 1e-12 * peak)
            terms.push_back({static_cast<double>(i), i % 2 == 0 ? x : -x, std::sin(angle), std::cos(angle)});
    }
    for (std::size_t j = 0; j < at.size(); ++j) {
        const double u = (at[j] - samples.start) / samples.step;
        if (!std::isfinite(u)) continue;
        const double place = std::round(u);
        // sin(pi (u - i)) is the same for all samples but for the sign, which the terms carry.
        const double sign = std::fmod(std::abs(place), 2.0) == 0.0 ? 1.0 : -1.0;
        const double common = sign * std::sin(pi * (u - place)) / N;
        const double sine = std::sin(pi * u / N), cosine = std::cos(pi * u / N);
        double sum = 0.0;
        for (const Term& term : terms) {
            if (std::abs(u - term.place) < 0.75) {  // close by, the sum rule would lose digits
                const double angle = pi * (u - term.place) / N;
                sum += std::abs(angle) < 1e-12 ? term.value * sign : term.value * common / std::tan(angle);
                continue;
            }
            sum += term.value * common * (cosine * term.cosine + sine * term.sine) /
                   (sine * term.cosine - cosine * term.sine);
        }
        result[j] = sum;
    }
    return result;
}

}  // namespace gg

#include <algorithm>

#include "wave/pulse.hpp"

namespace gg {

std::vector<double> band_limited(const Signal& samples, std::span<const double> at) {
    std::vector<double> result(at.size(), 0.0);
    const std::size_t count = samples.values.size();
    if (count == 0 || !(samples.step > 0.0)) return result;
    // The trigonometric polynomial through N even samples is sum x_i sin(pi (u - i)) / (N tan(pi (u - i) / N)), u in
    // steps. sin(pi (u - i)) is the same for all samples but for the sign; the cotangent of the difference comes from
    // tabled cotangents, b_i = pi (i + 1) / N, by the sum rule: one division a sample. Silent samples are skipped.
    const double N = 2.0 * static_cast<double>(count);
    double peak = 0.0;
    for (const double x : samples.values) peak = std::max(peak, std::abs(x));
    struct Term {
        double value, cotangent;
    };
    std::vector<Term> terms;
    std::vector<std::size_t> before(count + 1, 0);  // terms that belong to samples before the i-th
    for (std::size_t i = 0; i < count; ++i) {
        const double x = samples.values[i];
        if (std::abs(x) > 1e-12 * peak)
            terms.push_back({i % 2 == 0 ? x : -x, 1.0 / std::tan(pi * static_cast<double>(i + 1) / N)});
        before[i + 1] = terms.size();
    }
    for (std::size_t j = 0; j < at.size(); ++j) {
        const double u = (at[j] - samples.start) / samples.step;
        if (!(u >= -0.25 * N && u < 0.75 * N)) continue;  // beyond, the record would only repeat
        const double place = std::round(u), beside = u - place;
        const double sign = std::fmod(std::abs(place), 2.0) == 0.0 ? 1.0 : -1.0;
        const double sine = std::sin(pi * (u + 1.0) / N), cosine = std::cos(pi * (u + 1.0) / N);
        const auto sum = [&](std::size_t from, std::size_t to) {
            double total = 0.0;
            for (std::size_t i = from; i < to; ++i) {
                const double b = terms[i].cotangent;
                total += terms[i].value * (cosine * b + sine) / (sine * b - cosine);
            }
            return total;
        };
        // The nearest sample apart: there the sum rule would lose digits, or divide nothing by nothing.
        const bool inside = place >= 0.0 && place < static_cast<double>(count);
        const std::size_t nearest = inside ? static_cast<std::size_t>(place) : 0;
        const double far =
            inside ? sum(0, before[nearest]) + sum(before[nearest + 1], terms.size()) : sum(0, terms.size());
        result[j] = sign * std::sin(pi * beside) / N * far;
        if (inside) {
            const double angle = pi * beside / N;
            result[j] += samples.values[nearest] *
                         (std::abs(angle) < 1e-12 ? 1.0 : std::sin(pi * beside) / (N * std::tan(angle)));
        }
    }
    return result;
}

}  // namespace gg

#include "survey/rebuild.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>

#include "setting.hpp"
#include "survey/answers.hpp"

using namespace gg;

// Annan & Cosway 1992, from memory: window 1.3 x 2d/v at 1000/6f; samples by ceil. The 500 MHz row is 117 on paper, and
// 118 by plain floating-point ceil.
TEST_CASE("samples are counted as on paper") {
    struct Row {
        double window, f;
        int samples;
    };
    for (const Row& r : {Row{260, 50, 78}, Row{130, 100, 78}, Row{650.0 / 3.0, 100, 130}, Row{78, 200, 94},
                         Row{39, 500, 117}, Row{10.6145, 1000, 64}, Row{7.35391, 1600, 71}}) {
        CHECK(samples_for(r.window * 1e-9, 1e-6 / (6.0 * r.f)) == r.samples);
    }
    CHECK(samples_for(1.3 * 2.0 * 1.5 / 0.1 * 1e-9, 1.0 / (6.0 * 500e6)) == 117);
    CHECK(samples_for(-1.0, 1e-9) == 2);
    CHECK(samples_for(1.0, 0.0) == 2);
}

namespace {

const double f = 4e8;

RebuildError error_at(double per_period) {
    const Cases cases = cases_of(one_layer(1e8, 1.0, 0.1, f));
    return rebuild_error(cases.likely().echo, 1.0 / (per_period * f));
}

}  // namespace

TEST_CASE("six samples a period rebuild the Ricker wavelet to a thousandth, two cannot") {
    CHECK(error_at(6.0).band_limited < 2e-3);
    CHECK(error_at(2.0).band_limited > 0.1);
    CHECK(error_at(3.0).band_limited > error_at(4.0).band_limited);
    CHECK(error_at(4.0).band_limited > error_at(6.0).band_limited);
}

TEST_CASE("samples so fine that they fall on the places looked at rebuild the pulse, too") {
    for (double n : {60.0, 100.0, 1000.0}) CHECK(error_at(n).band_limited < 1e-3);
}

TEST_CASE("a sum of sinc functions passes through the samples and is a cosine between those of one") {
    std::vector<double> wave(401);
    for (int n = 0; n <= 400; ++n) wave[n] = std::cos(0.7 * (n - 200)) * std::exp(-1e-3 * (n - 200) * (n - 200));
    for (double place : {200.0, 197.0, 203.0 - 1e-12, 203.0 + 1e-12}) {
        CHECK(sinc_sum(wave, place) == wave[static_cast<std::size_t>(std::round(place))]);
    }
    for (double place : {200.5, 197.3, 210.0 + 1e-6}) {
        const double t = place - 200.0;
        CHECK(sinc_sum(wave, place) == doctest::Approx(std::cos(0.7 * t) * std::exp(-1e-3 * t * t)).epsilon(1e-9));
    }
    const std::vector<double> even{0.5, 1.0};
    CHECK(sinc_sum(even, 0.5) == doctest::Approx(1.5 * 2.0 / pi));
    CHECK(sinc_sum(even, -1.0) == 0.0);
    CHECK(sinc_sum(even, 2.0) == 0.0);
    CHECK(sinc_sum({}, 0.5) == 0.0);
}

// A chord over dt misses a crest of curvature 6 (pi fp)^2 by at most dt^2/8 of it: 1 - 6 (pi fp t)^2 near the top.
TEST_CASE("joined dots miss the crest by what its curvature says") {
    for (double n : {12.0, 24.0, 32.0}) {
        const double expected = 6.0 * pi * pi / (8.0 * n * n);
        CHECK(error_at(n).joined == doctest::Approx(expected).epsilon(0.2));
    }
}

TEST_CASE("the worst rebuilding error is what folding of the spectrum allows") {
    // Independent route: the energy above Nyquist folds back; the error cannot exceed twice the amplitude spectrum's
    // share beyond it, and for a symmetric pulse sampled at its worst it comes near that.
    for (double n : {2.5, 3.0, 3.5}) {
        double beyond = 0.0, all = 0.0;
        for (double x = 0.001; x < 6.0; x += 0.001) {
            const double s = x * x * std::exp(-x * x);
            all += s;
            if (x > 0.5 * n) beyond += s;
        }
        const double bound = 2.0 * beyond / all;
        CHECK(error_at(n).band_limited < 1.02 * bound);
        CHECK(error_at(n).band_limited > 0.4 * bound);
    }
}

TEST_CASE("the pulse's picture rebuilds what the wave room's trigonometric interpolation rebuilds") {
    Plan plan = three_layers();
    plan.pass.samples = 140;
    const PulsePicture p = answers_for(plan).pulse;
    REQUIRE(p.rebuilt.size() == p.returned.values.size());
    std::vector<double> at;
    for (std::size_t i = 0; i < p.returned.values.size(); ++i) at.push_back(p.returned.time(i));
    const std::vector<double> other = band_limited(p.samples, at);
    for (std::size_t i = 0; i < at.size(); ++i) {
        CHECK(std::abs(p.rebuilt[i] - other[i]) < 5e-3);
    }
}

TEST_CASE("joined dots pass through the samples and the picture's pulse peaks at 1") {
    const Plan plan = three_layers();
    const PulsePicture p = answers_for(plan).pulse;
    double peak = 0.0;
    for (double y : p.returned.values) peak = std::max(peak, std::abs(y));
    CHECK(peak <= 1.0 + 1e-3);
    CHECK(peak > 0.8);
    CHECK(p.samples.values.size() == static_cast<std::size_t>(plan.pass.samples));
    CHECK(p.amplitude > 0.0);
    CHECK(p.amplitude < 1.0);
}

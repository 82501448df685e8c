#include <doctest/doctest.h>

#include <algorithm>

#include "echo/apart.hpp"
#include "echo/noise.hpp"
#include "sections.hpp"
#include "wave/fourier.hpp"

// What must follow from the criterion of apart.hpp, whatever the pair.

using namespace gg;

namespace {

/// Two pipes of nearly one size and depth, steel or empty, under none or one boundary; either polarisation.
Scene random_pair(std::mt19937& random) {
    const auto chance = [&](double share) { return between(random, 0, 1) < share; };
    const auto from = [&](double low, double high) { return between(random, low, high); };
    Scene s;
    s.pulse.centre_frequency = from(300e6, 700e6);
    s.polarisation = chance(0.6) ? Polarisation::along : Polarisation::across;
    s.separation = from(0.04, 0.2);
    s.height = chance(0.5) ? 0.0 : from(0.0, 0.1);
    const double cover = chance(0.5) ? from(0.2, 0.4) : 0.0, top = cover + from(0.35, 0.6), radius = from(0.015, 0.04);
    // One draw a line: arguments are drawn in no order.
    const double over = from(0.0005, 0.005), under = from(0.001, 0.006);
    if (cover > 0.0) s.ground.slabs.push_back({constant_material(from(3, 7), over), cover});
    s.ground.slabs.push_back({constant_material(from(7, 14), under), 0.0});
    const Material inside = chance(0.5) ? metal() : air();
    const double larger = from(1.0, 1.2);
    s.targets = {{-0.15, top + radius, radius, inside, {}}, {0.15, top + larger * radius, larger * radius, inside, {}}};
    const double down = time_down(s.ground, top, s.pulse.centre_frequency).value;
    s.sampling = {-1.2, 0.02, 121, 0.0, 3.0 * down + 12.0 / s.pulse.centre_frequency, 0};
    s.sampling.samples = static_cast<int>(8.0 * s.sampling.window * s.pulse.centre_frequency);
    return s;
}

/// m; where no gap parts them, more than any.
double gap(const Scene& s, Reading reading) {
    const Value v = smallest_gap(s, reading);
    CHECK((v.ok() || v.issue == Issue::no_solution));
    return v.ok() ? v.value : 1e3;
}

template <class F>
void for_pairs(unsigned seed, int count, const F& f) {
    std::mt19937 random(seed);
    for (int i = 0; i < count; ++i) {
        const Scene s = random_pair(random);
        CAPTURE(i);
        REQUIRE(fault_of(s) == "");
        f(s);
    }
}

constexpr double found = 1.04;  // gaps are found to 3 %

}  // namespace

TEST_CASE("Louder noise never parts a pair sooner, and loud enough never") {
    for_pairs(31, 5, [](Scene s) {
        const Section section = section_of(s);
        const double quiet = std::max(0.0, 20.0 * std::log10(peak_of(section.direct) / peak_of(section.targets)));
        for (const Reading reading : {Reading::raw, Reading::focused}) {
            double largest = 0.0;
            for (const double above : {80.0, 30.0, 20.0, 14.0, 0.0}) {  // dB from the noise up to the strongest echo
                s.noise.dynamic_range = quiet + above;
                const double now = gap(s, reading);
                CAPTURE(above);
                CHECK(now > largest / found);
                largest = std::max(largest, now);
            }
            // Noise as strong as the echo hides any dip of a raw row; focusing adds many traces up.
            CHECK(largest > (reading == Reading::raw ? 999.0 : 0.0));
        }
        // Stacks are as good as dynamic range: 100 of them 20 dB.
        s.noise = {quiet, 100, 1};
        Scene better = s;
        better.noise = {quiet + 20.0, 1, 1};
        CHECK(std::fabs(gap(s, Reading::raw) / gap(better, Reading::raw) - 1.0) < 1e-6);
    });
}

TEST_CASE("Deeper pairs need a larger gap, a higher frequency parts nearer ones, focusing never parts later") {
    for_pairs(32, 5, [](const Scene& s) {
        const double raw = gap(s, Reading::raw), focused = gap(s, Reading::focused);
        CHECK(focused < raw * found);
        Scene deep = s;
        for (RoundTarget& t : deep.targets) t.depth += 0.6;
        deep.sampling.window *= 2.0;
        deep.sampling.samples *= 2;
        CHECK(gap(deep, Reading::raw) > 1.1 * raw);
        // Focused, what counts is the angle under which the line sees the pair, the same at any depth: loss and the
        // antenna's separation leave it within a tenth.
        CHECK(gap(deep, Reading::focused) > 0.87 * focused);
        Scene sharp = s;
        sharp.pulse.centre_frequency *= 1.5;
        sharp.sampling.samples = static_cast<int>(1.5 * s.sampling.samples);
        CHECK(gap(sharp, Reading::raw) < 0.95 * raw);
        CHECK(gap(sharp, Reading::focused) < 0.95 * focused);
    });
}

TEST_CASE("A pair seen from the other end of the line parts at the same gap") {
    for_pairs(33, 5, [](const Scene& s) {
        Scene m = s;
        for (RoundTarget& t : m.targets) t.x = -t.x;
        m.sampling.first = -(s.sampling.first + s.sampling.step * (s.sampling.traces - 1));
        for (const Reading reading : {Reading::raw, Reading::focused})
            CHECK(std::fabs(gap(m, reading) / gap(s, reading) - 1.0) < 0.03);
    });
}

TEST_CASE("Noise makes two readings of one envelope differ by three times sqrt(2) its own once in 700") {
    // What the criterion's noise term rests on: a steady echo far above the noise, read at places far apart.
    constexpr int length = 4096, spacing = 16, rounds = 800;
    constexpr double sigma = 0.02;
    int readings = 0, beyond = 0;
    for (int round = 0; round < rounds; ++round) {
        std::vector<double> trace = white_noise(length, sigma, static_cast<std::uint64_t>(round + 1));
        for (int i = 0; i < length; ++i) trace[static_cast<std::size_t>(i)] += std::cos(2.0 * pi * 410.0 / length * i);
        const std::vector<double> e = envelope(trace);
        for (std::size_t i = spacing; i + spacing < length; i += 2 * spacing, ++readings)
            beyond += e[i] - e[i + spacing] > 3.0 * std::sqrt(2.0) * sigma ? 1 : 0;
    }
    // Of a normal number past three times its spread: 1 in 741; 138 of 102,000 wanted, four times their root allowed.
    CHECK(readings > 100000);
    CHECK(std::fabs(beyond - readings / 741.0) < 4.0 * std::sqrt(readings / 741.0));
}

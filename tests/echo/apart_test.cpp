#include "echo/apart.hpp"

#include <doctest/doctest.h>

#include <algorithm>

#include "sections.hpp"

using namespace gg;

namespace {

Scene pair(double gap) {
    Scene s;
    s.pulse.centre_frequency = 400e6;
    s.separation = 0.16;
    s.ground.slabs = {{constant_material(5, 0.002), 0.4}, {constant_material(9, 0.005), 0.0}};
    s.targets = {{-0.5 * gap, 0.9, 0.04, metal(), {}}, {0.5 * gap, 0.9, 0.04, metal(), {}}};
    s.sampling = {-1.2, 0.02, 121, 0.0, 32e-9, 320};
    return s;
}

/// Two Ricker echoes `apart` seconds from each other on a fine grid, the second times `sign`.
constexpr double fp = 400e6, dt = 0.02e-9;
std::vector<double> two_rickers(double apart, double sign) {
    std::vector<double> trace(1000);
    const auto ricker = [](double t) {
        const double u = (pi * fp * t) * (pi * fp * t);
        return (1.0 - 2.0 * u) * std::exp(-u);
    };
    for (std::size_t i = 0; i < trace.size(); ++i) {
        const double t = static_cast<double>(i) * dt - 10e-9;
        trace[i] = ricker(t + 0.5 * apart) + sign * ricker(t - 0.5 * apart);
    }
    return trace;
}
Dip reading_of(double apart, double sign, double sigma = 0.0) {
    return dip_down(two_rickers(apart, sign), dt, 10e-9 - 0.5 * apart, 10e-9 + 0.5 * apart, sigma);
}

}  // namespace

TEST_CASE("Neighbours far apart are two, neighbours near are one, and focusing parts them sooner") {
    for (const Reading reading : {Reading::raw, Reading::focused}) {
        const Scene near = pair(0.1), far = pair(0.5);
        CHECK(!dip_sideways(near, section_of(near), reading).apart());
        CHECK(dip_sideways(far, section_of(far), reading).apart());
    }
    const Value raw = smallest_gap(pair(0.3), Reading::raw), focus = smallest_gap(pair(0.3), Reading::focused);
    REQUIRE(raw.ok());
    REQUIRE(focus.ok());
    CHECK(focus.value < 0.75 * raw.value);
    // sqrt(v r W / 2), r to the top, is 0.27 m here: a rule of thumb, so within a factor of 1.5.
    CHECK(raw.value > 0.27 / 1.5);
    CHECK(raw.value < 0.27 * 1.5);
}

TEST_CASE("At the smallest gap the pair is two, a tenth closer it is one") {
    for (const Reading reading : {Reading::raw, Reading::focused}) {
        const double gap = smallest_gap(pair(0.3), reading).value;
        Scene at = pair(gap), closer = pair(0.9 * gap);
        // Positions on the grid that the search stood on: about the middle of the pair.
        CHECK(dip_sideways(at, section_of(at), reading).depth >
              dip_sideways(closer, section_of(closer), reading).depth);
        CHECK(dip_sideways(at, section_of(at), reading).apart());
        CHECK(!dip_sideways(closer, section_of(closer), reading).apart());
    }
}

TEST_CASE("A higher frequency parts neighbours sooner, a coarse step and a loud noise later or never") {
    Scene s = pair(0.3), high = s, coarse = s, loud = s;
    high.pulse.centre_frequency = 900e6;
    coarse.sampling.step = 0.45;
    coarse.sampling.traces = 7;
    loud.noise.dynamic_range = 20.0;
    const double plain = smallest_gap(s, Reading::raw).value;
    CHECK(smallest_gap(high, Reading::raw).value < 0.8 * plain);
    const Value rough = smallest_gap(coarse, Reading::raw);
    CHECK((!rough.ok() || rough.value > 1.2 * plain));
    const Dip noisy = dip_sideways(loud, section_of(loud), Reading::raw);
    CHECK(noisy.needed > 0.1);
    CHECK(!noisy.apart());
}

TEST_CASE("Two echoes down one trace part where their envelopes dip, later the louder the noise") {
    CHECK(!reading_of(0.3 / fp, 1.0).apart());
    CHECK(reading_of(1.2 / fp, 1.0).apart());
    CHECK(reading_of(1.2 / fp, -1.0).apart());
    const Dip clear = reading_of(1.2 / fp, 1.0);
    CHECK(std::fabs(clear.second - clear.first - 1.2 / fp) < 0.1 / fp);
    CHECK(!reading_of(1.2 / fp, 1.0, 0.3).apart());
}

TEST_CASE("A thin bed is loudest at the tuning thickness of a Ricker wavelet and follows Widess below it") {
    // Tuning at a two-way time of sqrt(6) / (2 pi fp), peak 1 + 2 exp(-3/2) = 1.44626 (derived; Chung & Lawton 1992 for
    // lambda/8 as the thin-bed bound); composite peaks against two-way time, opposite polarity.
    const auto peak = [](double apart) {
        double top = 0.0;
        for (const double v : two_rickers(apart, -1.0)) top = std::max(top, std::fabs(v));
        return top;
    };
    const double rows[][2] = {{0.05, 0.304074}, {0.1, 0.593312},     {0.194924, 1.05444},
                              {0.3, 1.36609},   {0.389848, 1.44626}, {0.6, 1.19311}};
    for (const auto& row : rows) CHECK(std::fabs(peak(row[0] / fp) - row[1]) < 2e-3);
    double loudest = 0.0, at = 0.0;
    for (double apart = 0.2 / fp; apart < 0.6 / fp; apart += 0.002 / fp) {
        if (peak(apart) > loudest) loudest = peak(apart), at = apart;
    }
    CHECK(std::fabs(at * fp - std::sqrt(6.0) / (2.0 * pi)) < 0.01);
    // Widess 1973 (Geophysics 38(6), from memory): below an eighth of a wavelength the shape no longer changes, so the
    // bed has no two echoes to be told apart, only an amplitude in proportion to its thickness.
    CHECK(!reading_of(0.25 / fp, -1.0).apart());
    CHECK(std::fabs(peak(0.05 / fp) / peak(0.1 / fp) - 0.5) < 0.02);
}

TEST_CASE("In the full section a bed in weak contrast is loudest near the tuning thickness of what returns") {
    // 9.4 in 9: a line source's echo holds sqrt(f) more than its current, so its spectrum f^2.5 exp(-f^2/fp^2) peaks at
    // sqrt(1.25) fp and tunes at about 1/sqrt(1.2) of the Ricker's thickness: between a sixth and a quarter wavelength.
    double loudest = 0.0, at = 0.0;
    Scene s;
    s.pulse.centre_frequency = fp;
    s.separation = 0.0;
    s.sampling = {0.0, 0.1, 1, 0.0, 20e-9, 1000};
    const double wave = speed_of_light / 3.0 / fp;
    for (double share = 0.10; share < 0.35; share += 0.005) {
        s.ground.slabs = {{constant_material(9.0, 0.0), 0.6},
                          {constant_material(9.4, 0.0), share * wave},
                          {constant_material(9.0, 0.0), 0.0}};
        const Section section = section_of(s);
        double top = 0.0;
        for (const double v : section.layers) top = std::max(top, std::fabs(v));
        if (top > loudest) loudest = top, at = share;
    }
    CHECK(at > 0.155);
    CHECK(at < 0.200);
}

TEST_CASE("Targets one above the other and the two walls of one pipe part from a size on") {
    Scene s = pair(0.3);
    s.targets = {{0.0, 0.7, 0.02, constant_material(1, 0), {}}, {0.0, 1.1, 0.02, constant_material(1, 0), {}}};
    CHECK(dip_downwards(s, section_of(s)).apart());
    const Value drop = smallest_drop(s);
    REQUIRE(drop.ok());
    CHECK(drop.value < 0.3);
    CHECK(drop.value > 0.04);
    Scene pipe = s;
    pipe.targets = {{0.0, 1.2, 0.3, constant_material(3, 0.0), {}}};
    pipe.sampling.window = 50e-9;
    const Value bore = smallest_diameter(pipe);
    REQUIRE(bore.ok());
    // Half a pulse's length in the filling: v W / 2 = 0.147 m, within a factor of 2.
    CHECK(bore.value > 0.07);
    CHECK(bore.value < 0.3);
    pipe.targets[0].inside = metal();
    CHECK(smallest_diameter(pipe).issue == Issue::no_solution);
}

#include "echo/focus.hpp"

#include <doctest/doctest.h>

#include <algorithm>

#include "sections.hpp"
#include "wave/fourier.hpp"

using namespace gg;

namespace {

/// Time at which a trace's envelope peaks, with a parabola through the three highest samples, s.
double peak_time(const Section& s, int trace) {
    const std::vector<double> e = envelope(
        std::span(s.targets).subspan(static_cast<std::size_t>(trace) * s.samples, static_cast<std::size_t>(s.samples)));
    const std::size_t i = static_cast<std::size_t>(std::max_element(e.begin() + 1, e.end() - 1) - e.begin());
    const double bend = e[i - 1] - 2 * e[i] + e[i + 1];
    return s.start + s.dt * (static_cast<double>(i) + 0.5 * (e[i - 1] - e[i + 1]) / bend);
}

struct Spot {
    double x, depth;
};
Spot brightest(const Image& image) {
    std::size_t best = 0;
    for (std::size_t i = 0; i < image.values.size(); ++i) {
        if (std::fabs(image.values[i]) > std::fabs(image.values[best])) best = i;
    }
    const std::size_t rows = static_cast<std::size_t>(image.rows);
    return {image.first + image.step * static_cast<double>(best / rows),
            image.spacing * static_cast<double>(best % rows)};
}

Scene one_bar() {
    Scene s;
    s.pulse.centre_frequency = 900e6;
    s.ground.slabs = {{constant_material(9, 0.001), 0.0}};
    s.targets = {{1.0, 0.6, 0.02, metal(), {}}};
    s.sampling = {0.0, 0.02, 101, 0.0, 25e-9, 400};
    return s;
}

}  // namespace

TEST_CASE("Echoes arrive along the hyperbola of a cylinder, radius and antenna separation reckoned with") {
    // Section 14's geometry: zero offset (2/v)(sqrt(x^2 + (d + R)^2) - R); apart, the shortest way by a point of the
    // circle (Fermat). Rows: x, d, R and half separation h in m, v = 0.1 m/ns (the last 0.12), time in ns.
    struct Row {
        double x, d, R, h, v, time;
    };
    const Row rows[] = {{0, 1, 0.1, 0, 0.1, 20.0000},      {0.5, 1, 0.1, 0, 0.1, 22.1661},
                        {1, 1, 0.1, 0, 0.1, 27.7321},      {0, 1, 0.1, 0.25, 0.1, 20.6155},
                        {0.5, 1, 0.1, 0.25, 0.1, 22.6322}, {1, 1, 0.1, 0.25, 0.1, 27.9812},
                        {0, 0.3, 0.15, 0, 0.12, 5.00000},  {0, 0.3, 0.15, 0.1, 0.12, 5.27046}};
    for (const Polarisation polarisation : {Polarisation::along, Polarisation::across}) {
        double at_apex = 0.0;
        for (const Row& row : rows) {
            Scene s;
            s.polarisation = polarisation;
            s.pulse.centre_frequency = row.v > 0.11 ? 2e9 : 900e6;
            const double n = speed_of_light / (row.v * 1e9);
            s.ground.slabs = {{constant_material(n * n, 0.0), 0.0}};
            s.targets = {{0.0, row.d + row.R, row.R, metal(), {}}};
            s.separation = 2.0 * row.h;
            s.sampling = {row.x, 0.5, 1, 0.0, 1.25 * row.time * 1e-9, 700};
            const double late = peak_time(section_of(s), 0) - row.time * 1e-9;
            // The surface and the antennas' pattern delay every echo by about the same small share of a period: that of
            // the apex with the antennas in one place is taken out.
            if (row.x == 0.0 && row.h == 0.0) at_apex = late;
            CAPTURE(row.x);
            CAPTURE(row.h);
            CHECK(std::fabs(at_apex) < 0.25 / s.pulse.centre_frequency);
            CHECK(std::fabs(late - at_apex) < 0.08 / s.pulse.centre_frequency);
        }
    }
}

TEST_CASE("A bar is focused to its place, whatever the separation, height and start of the record") {
    for (const double separation : {0.0, 0.2}) {
        for (const double height : {0.0, 0.1}) {
            for (const double start : {-1e-9, 2e-9}) {
                Scene s = one_bar();
                s.separation = separation;
                s.height = height;
                s.sampling.start = start;
                const Image image = focused(s, section_of(s).targets);
                REQUIRE(image.issue == Issue::none);
                const Spot spot = brightest(image);
                CAPTURE(separation);
                CAPTURE(height);
                CHECK(std::fabs(spot.x - 1.0) < 0.021);
                CHECK(std::fabs(spot.depth - 0.58) < 0.02);  // a sixth of a wavelength
            }
        }
    }
}

TEST_CASE("Through two boundaries a bar is focused to its place, and a wrong speed puts it elsewhere") {
    Scene s = one_bar();
    s.ground.slabs = {
        {constant_material(4, 0.0), 0.2}, {constant_material(9, 0.0), 0.25}, {constant_material(16, 0.0), 0.0}};
    const Section section = section_of(s);
    const Spot right = brightest(focused(s, section.targets));
    CHECK(std::fabs(right.x - 1.0) < 0.021);
    CHECK(std::fabs(right.depth - 0.58) < 0.02);
    Scene wrong = s;
    for (Slab& slab : wrong.ground.slabs) slab.material = constant_material(4, 0.0);
    CHECK(brightest(focused(wrong, section.targets)).depth > 0.7);
}

TEST_CASE("Focusing narrows: the hyperbola's flank is gone where the bar is not") {
    const Scene s = one_bar();
    const Section section = section_of(s);
    const Image image = focused(s, section.targets);
    double raw_peak = 0.0, raw_side = 0.0, side = 0.0;
    for (int i = 0; i < section.samples; ++i) {
        raw_peak = std::max(raw_peak, std::fabs(section.at(50, i)));
        raw_side = std::max(raw_side, std::fabs(section.at(70, i)));
    }
    for (int i = 0; i < image.rows; ++i) side = std::max(side, std::fabs(image.at(70, i)));
    CHECK(raw_side > 0.4 * raw_peak);
    CHECK(side < 0.1);
}

TEST_CASE("A record that does not fit its scene is refused, an empty one gives an empty picture") {
    const Scene s = one_bar();
    CHECK(focused(s, {1.0, 2.0}).issue == Issue::out_of_range);
    const std::vector<double> silence(static_cast<std::size_t>(s.sampling.traces * s.sampling.samples), 0.0);
    const Image image = focused(s, silence);
    CHECK(image.issue == Issue::none);
    for (const double v : image.values) CHECK(v == 0.0);
}

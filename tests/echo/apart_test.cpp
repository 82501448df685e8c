#include "echo/apart.hpp"

#include <doctest/doctest.h>

#include <algorithm>

#include "sections.hpp"
#include "wave/fourier.hpp"

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
constexpr double fp = 400e6, dt = 0.005e-9;
std::vector<double> two_rickers(double apart, double sign) {
    std::vector<double> trace(4000);
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
        const Scene near = pair(0.1), far = pair(0.9);
        CHECK(!dip_sideways(near, section_of(near), reading).apart());
        CHECK(dip_sideways(far, section_of(far), reading).apart());
    }
    const Value raw = smallest_gap(pair(0.3), Reading::raw), focus = smallest_gap(pair(0.3), Reading::focused);
    REQUIRE(raw.ok());
    REQUIRE(focus.ok());
    CHECK(focus.value < 0.75 * raw.value);
    // sqrt(v r W / 2), r to the top, is 0.27 m here; the flanks in the middle are half a pulse late at twice that. A
    // rule of thumb, so within a factor of 1.5.
    CHECK(raw.value > 2.0 * 0.27 / 1.5);
    CHECK(raw.value < 2.0 * 0.27 * 1.5);
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
    coarse.sampling.step = 1.2;
    coarse.sampling.traces = 3;
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
    // As the criterion says: three times the spread of a difference, but never less than a reading's 5 %.
    const Dip loud = reading_of(1.2 / fp, 1.0, 0.1);
    CHECK(std::fabs(loud.needed - 3.0 * std::sqrt(2.0) * 0.1 / loud.lower_peak) < 1e-12);
    CHECK(clear.needed == 0.05);
    CHECK(reading_of(1.2 / fp, 1.0, 0.005).needed == 0.05);
}

TEST_CASE("Two Ricker echoes part at a time apart of 0.618 periods, of one sign at 0.316; tuning lies between") {
    // By an envelope on a grid 10 times finer (scipy.signal.hilbert) and the criterion of apart.hpp. Tuning, where
    // echoes of opposite sign are loudest: sqrt(6) / (2 pi) = 0.390 periods. Of one sign they part sooner, by the null
    // that their interference puts between them.
    const auto parts_at = [](double sign) {
        double none = 0.2, two = 0.8;
        while (two - none > 1e-3) {
            const double middle = 0.5 * (none + two);
            (reading_of(middle / fp, sign).apart() ? two : none) = middle;
        }
        return two;
    };
    CHECK(std::fabs(parts_at(-1.0) - 0.618) < 0.01);
    CHECK(std::fabs(parts_at(1.0) - 0.316) < 0.01);
    // Widess 1973 (Geophysics 38(6), from memory): below an eighth of a wavelength, a time apart of a quarter period,
    // the shape no longer changes: the bed has no two echoes to be told apart, only an amplitude.
    for (const double sign : {-1.0, 1.0}) CHECK(!reading_of(0.25 / fp, sign).apart());
}

TEST_CASE("In the full section a thin bed is loudest at the Ricker wavelet's tuning thickness, as Widess below it") {
    // What a line source gets back over a long way holds sqrt(jf) more than its current: a current of spectrum
    // f^1.5 exp(-0.75 (f/f0)^2) comes back as a Ricker wavelet of f0 / sqrt(0.75), turned by 45 degrees.
    Scene s;
    double narrow = 1.34, wide = 1.6;
    s.pulse.family = PulseFamily::gaussian_derivative;
    while (wide - narrow > 1e-9) {
        s.pulse.bandwidth = 0.5 * (narrow + wide);
        (order_of(s.pulse) > 1.5 ? narrow : wide) = s.pulse.bandwidth;
    }
    s.pulse.centre_frequency = fp * std::sqrt(0.75);
    s.sampling = {0.0, 0.1, 1, 30e-9, 20e-9, 1000};
    const double index = 1.01, v = speed_of_light / index, deep = 6.0;
    const Material bed = constant_material(index * index, 0.0);
    const auto echo = [&](double apart) {  // s between top and bottom; 0: the top alone
        s.ground.slabs = {{air(), deep}, {bed, apart * v / 2.0}, {air(), 0.0}};
        if (apart == 0.0) s.ground.slabs = {{air(), deep}, {bed, 0.0}};
        std::vector<Complex> spectrum = forward(section_of(s).layers);
        for (Complex& value : spectrum) value *= std::polar(1.0, -pi / 4.0);
        spectrum.front() = spectrum.back() = 0.0;
        return inverse(spectrum, 1000);
    };
    const double one = peak_of(echo(0.0));
    const auto loudness = [&](double apart) { return peak_of(echo(apart)) / one; };
    // Peak of two opposite Ricker wavelets against the time between them in periods; the largest is 1 + 2 exp(-3/2) at
    // sqrt(6) / (2 pi) (derived; tuning at a quarter wavelength: Kallweit & Wood 1982, Geophysics 47(7)).
    const double rows[][2] = {{0.05, 0.304074}, {0.1, 0.593312},     {0.194924, 1.05444},
                              {0.3, 1.36609},   {0.389848, 1.44626}, {0.6, 1.19311}};
    for (const auto& row : rows) CHECK(std::fabs(loudness(row[0] / fp) / row[1] - 1.0) < 0.015);
    double loudest = 0.0, at = 0.0;
    for (double apart = 0.3; apart < 0.5; apart += 0.005) {
        const double value = loudness(apart / fp);
        if (value > loudest) loudest = value, at = apart;
    }
    CHECK(std::fabs(at - std::sqrt(6.0) / (2.0 * pi)) < 0.015);
    // And our own downward separation parts its top from its bottom where it parts two Ricker wavelets.
    const double top = 2.0 * deep / speed_of_light - s.sampling.start;
    const auto apart_at = [&](double apart) {
        return dip_down(echo(apart), 20e-9 / 1000, top, top + apart, 0.0).apart();
    };
    CHECK(!apart_at(0.25 / fp));
    CHECK(!apart_at(0.59 / fp));
    CHECK(apart_at(0.645 / fp));
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

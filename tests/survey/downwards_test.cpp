#include "survey/downwards.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>

#include "setting.hpp"

using namespace gg;

namespace {

const double f = 4e8;

EchoPulse clean_echo() { return cases_of(one_layer(1e8, 1.0, 0.1, f)).all.front().echo; }

}  // namespace

// Derived: the Ricker wavelet's inflection at 0.167001/fp; two equal ones show a flat spot at 0.334001/fp.
TEST_CASE("two Ricker echoes leave their flat spot at 0.334 of a period") {
    const Value flat = smallest_delay(clean_echo(), 0.0);
    CHECK(flat.ok());
    // The dip grows with the square of the distance beyond, so that the search's 1e-4 costs 1.5 % of delay.
    CHECK(flat.value * f == doctest::Approx(0.334001).epsilon(0.015));
}

// Independent route: the closed form of the wavelet, on a fine grid.
TEST_CASE("the dip of 19 percent comes where the closed-form wavelet says") {
    const auto ricker = [](double x) { return (1.0 - 2.0 * pi * pi * x * x) * std::exp(-pi * pi * x * x); };
    double delay = 0.33;
    for (; delay < 1.0; delay += 1e-4) {
        double crest = 0.0;
        for (double x = -0.3; x < 0.5 * delay; x += 1e-3) crest = std::max(crest, ricker(x) + ricker(x - delay));
        if (1.0 - 2.0 * ricker(0.5 * delay) / crest >= apart_dip) break;
    }
    CHECK(smallest_delay(clean_echo(), apart_dip).value * f == doctest::Approx(delay).epsilon(0.01));
}

// Derived: opposite echoes 0.389848/fp apart (sqrt 6 / 2 pi) add to 1 + 2 exp(-3/2) = 1.44626, their most.
TEST_CASE("opposite Ricker echoes tune at 0.3898 of a period to 1.446") {
    const EchoPulse e = clean_echo();
    const auto most = [&](double delay) {
        double top = 0.0;
        for (double t = -1.0 / f; t < 2.0 / f; t += 0.002 / f)
            top = std::max(top, std::abs(e.trace(t) - e.trace(t - delay)));
        return top;
    };
    CHECK(most(0.389848 / f) == doctest::Approx(1.44626).epsilon(1e-3));
    CHECK(most(0.05 / f) == doctest::Approx(0.304074).epsilon(2e-3));
    CHECK(most(0.6 / f) == doctest::Approx(1.19311).epsilon(1e-3));
    CHECK(most(1.2 / f) == doctest::Approx(1.00002).epsilon(1e-3));
    CHECK(most(0.37 / f) < most(0.389848 / f));
    CHECK(most(0.41 / f) < most(0.389848 / f));
}

TEST_CASE("the dip only deepens as two echoes part, and one echo has none") {
    const EchoPulse e = clean_echo();
    CHECK(dip_between(e, 0.0) == 0.0);
    CHECK(dip_between(e, std::nan("")) == 0.0);
    double before = 0.0;
    for (double x = 0.05; x < 1.5; x += 0.05) {
        const double dip = dip_between(e, x / f);
        CHECK(dip >= before - 0.01);
        before = dip;
    }
    CHECK(before > 0.9);
}

TEST_CASE("a pulse the ground has smeared parts layers worse than the one sent") {
    Plan plan = one_layer(1e8, 1.0, 0.1, f);
    plan.ground = {own_layer(9.0, 0.02, 1.0)};
    plan.ground[0].matter = matter_of("wet-clay");
    for (int i = 0; i < input_count; ++i) {
        Range& r = plan.ground[0].matter.inputs[static_cast<Input>(i)];
        r.low = r.high = r.likely;
    }
    const Cases shallow = cases_of(plan);
    plan.target.depth = exactly(5.0);
    const Cases deep = cases_of(plan);
    CHECK(deep.likely().echo.frequency < shallow.likely().echo.frequency);
    CHECK(smallest_delay(deep.likely().echo, apart_dip).value > smallest_delay(shallow.likely().echo, apart_dip).value);
}

TEST_CASE("a narrow-band pulse that rings is judged by its envelope and still gives an answer") {
    Plan plan = one_layer(1e8, 1.0, 0.1, f);
    plan.antenna.pulse.family = PulseFamily::gaussian_derivative;
    plan.antenna.pulse.bandwidth = 0.3;
    const EchoPulse narrow = cases_of(plan).all.front().echo;
    const Value delay = smallest_delay(narrow, apart_dip);
    CHECK(delay.ok());
    CHECK(delay.value > 2.0 * smallest_delay(clean_echo(), apart_dip).value);
}

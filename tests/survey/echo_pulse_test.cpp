#include "survey/echo_pulse.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>

#include "setting.hpp"

using namespace gg;

namespace {

double at(const Signal& s, double t) {
    const double place = (t - s.start) / s.step;
    if (place < 0.0 || place >= static_cast<double>(s.values.size()) - 1.0) return 0.0;
    const auto i = static_cast<std::size_t>(place);
    const double u = place - static_cast<double>(i);
    return (1.0 - u) * s.values[i] + u * s.values[i + 1];
}

}  // namespace

TEST_CASE("without loss the echo is the Ricker wavelet itself, delayed") {
    const double f = 4e8;
    const Cases cases = cases_of(one_layer(1e8, 1.0, 0.1, f));
    const EchoPulse& e = cases.likely().echo;
    CHECK(e.arrival == doctest::Approx(20e-9).epsilon(1e-6));
    CHECK(std::abs(e.loss) < 1e-3);
    for (double t = -3e-9; t <= 3e-9; t += 0.07e-9) {
        const double u = std::pow(pi * f * t, 2);
        // The band ends at -70 dB: what is cut off is less than 1e-3 of the peak.
        CHECK(std::abs(e.trace(t) - (1.0 - 2.0 * u) * std::exp(-u)) < 1e-3);
    }
    // Mean of the amplitude spectrum 1.12838 fp (derived).
    CHECK(e.frequency / f == doctest::Approx(1.12838).epsilon(1e-3));
}

TEST_CASE("in lossy layers the echo agrees with the wave room's returned pulse") {
    for (double depth : {0.2, 0.9, 2.0}) {
        Plan plan = three_layers();
        plan.target.depth = exactly(depth);
        const Cases cases = cases_of(plan);
        const EchoPulse& e = cases.likely().echo;
        const Returned r = returned_pulse(likely_stack(plan), depth, plan.antenna.pulse);
        CHECK(e.arrival == doctest::Approx(r.arrival).epsilon(2e-3));
        CHECK(e.width == doctest::Approx(r.width).epsilon(0.01));
        CHECK(e.loss == doctest::Approx(-20.0 * std::log10(r.amplitude)).epsilon(2e-3));
        for (double t = -e.width; t <= e.width; t += 0.1 * e.width) {
            CHECK(std::abs(e.trace(t + r.arrival - e.arrival) - at(r.signal, r.arrival + t) / r.amplitude) < 0.02);
        }
    }
}

TEST_CASE("an echo that has lost 3000 dB still has its shape") {
    Plan plan = one_layer(1e8, 10.0, 0.1, 4e8);
    plan.ground = {own_layer(20.0, 1.0, 1.0)};
    const Cases cases = cases_of(plan);
    const EchoPulse& e = cases.likely().echo;
    CHECK(e.loss > 1000.0);
    CHECK(std::isfinite(e.width));
    CHECK(e.envelope(0.0) == doctest::Approx(1.0));
}

TEST_CASE("the upright part is the real part of the echo, and nothing outside the record") {
    const Cases cases = cases_of(three_layers());
    const EchoPulse& e = cases.likely().echo;
    double most = 0.0;
    for (double t = -1.2 * e.reach; t < 1.2 * e.reach; t += 0.01 * e.reach) {
        CHECK(e.upright(t) == e.at(t).real());
        most = std::max(most, e.upright(t));
    }
    CHECK(most > 0.9);
    CHECK(e.upright(2.0 * e.reach) == 0.0);
    CHECK(EchoPulse().upright(0.0) == 0.0);
}

TEST_CASE("grounds that have a layer in common share its wavenumbers, those of its material") {
    const Cases cases = cases_of(three_layers());
    REQUIRE(cases.grounds.size() == 5);
    int shared = 0;
    for (const auto& ground : cases.grounds) {
        CHECK(ground->spectrum.sent == cases.grounds[0]->spectrum.sent);
        for (std::size_t i = 0; i < ground->stack.slabs.size(); ++i) {
            const Material& material = ground->stack.slabs[i].material;
            const double f = ground->spectrum.sent->frequency(20);
            CHECK((*ground->spectrum.layers[i])[20] == wavenumber(material, f));
            const bool same = ground->spectrum.layers[i] == cases.grounds[0]->spectrum.layers[i];
            CHECK(same == (material == cases.grounds[0]->stack.slabs[i].material));
            shared += same;
        }
    }
    CHECK(shared > 3);
}

#include "echo/engine.hpp"

#include "echo/apart.hpp"
#include "echo/noise.hpp"
#include "sections.hpp"

using namespace gg;

TEST_CASE("An engine whose targets were moved gives what a new one gives for them there") {
    std::mt19937 random(51);
    for (int i = 0; i < 6; ++i) {
        const Scene s = random_scene(random);
        CAPTURE(i);
        REQUIRE(fault_of(s) == "");
        constexpr double spread = 0.04;
        Engine engine(s, 1.0, spread);
        for (const double by : {spread, -0.7 * spread, 0.0}) {
            Scene moved = s;
            std::vector<double> x;
            double side = by;
            for (RoundTarget& t : moved.targets) {
                x.push_back(t.x += side);
                side = -side;
            }
            if (!fault_of(moved).empty()) continue;
            const std::vector<double> echoes = engine.echoes(x);
            CHECK(apart(echoes, section_of(moved).targets) < 1e-2);
            CHECK(engine.echoes(x) == echoes);
        }
    }
}

TEST_CASE("The noise goes by the direct wave itself, wherever the record starts and however it is sampled") {
    Scene s = two_pipes();
    s.noise = {60.0, 4, 1};
    const Section whole = section_of(s);
    const double level = noise_level(s);
    CHECK(level == doctest::Approx(peak_of(whole.direct) * 1e-3 / 2.0).epsilon(0.02));
    CHECK(rms(whole.noise) == doctest::Approx(level).epsilon(0.05));
    for (const double start : {2e-9, 10e-9}) {
        Scene later = s;
        later.sampling.start = start;
        CHECK(noise_level(later) == doctest::Approx(level).epsilon(1e-9));
    }
    s.sampling.samples = 16;
    CHECK(noise_level(s) == doctest::Approx(level).epsilon(1e-9));
}

TEST_CASE("One bright apex midway between two pipes is one, whatever nulls stand beside it") {
    Scene s;
    s.pulse.centre_frequency = 383e6;
    s.separation = 0.1;
    s.ground.slabs = {{constant_material(9, 0.002), 0.0}};
    s.targets = {{-0.125, 0.43, 0.02, constant_material(1, 0.0), {}},
                 {0.125, 0.43, 0.02, constant_material(1, 0.0), {}}};
    s.sampling = {-1.2, 0.02, 121, 0.0, 30e-9, 300};
    const Section section = section_of(s);
    // In the row of first arrivals the middle is brighter than what stands over the pipes...
    double over = 0.0, middle = 0.0;
    for (int i = 0; i < section.samples; ++i) {
        if (i * section.dt > 10.5e-9) break;
        over = std::max(over, std::fabs(section.at(54, i)));
        middle = std::max(middle, std::fabs(section.at(60, i)));
    }
    CHECK(middle > over);
    // ...so that they are one, and are two only where it is not.
    CHECK(!dip_sideways(s, section, Reading::raw).apart());
    CHECK(smallest_gap(s, Reading::raw).value > 0.3);
}

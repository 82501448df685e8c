#include "survey/path.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>

#include "setting.hpp"
#include "survey/sideways.hpp"

using namespace gg;

TEST_CASE("a leg takes the time of the ray that the wave room traces") {
    const Plan plan = three_layers();
    const Stack stack = likely_stack(plan);
    const double f = plan.antenna.pulse.centre_frequency;
    for (double height : {0.0, 0.3}) {
        for (double depth : {0.2, 0.65, 1.5}) {
            for (double offset : {0.0, 0.05, 0.4, 2.0, 30.0}) {
                Plan lifted = plan;
                lifted.antenna.height = height;
                lifted.target.depth = exactly(depth);
                const Cases cases = cases_of(lifted);
                const Ray ray = ray_to(stack, height, offset, depth, f);
                CHECK(leg_to(cases.likely().path, offset).time == doctest::Approx(ray.time).epsilon(1e-10));
                CHECK(leg_to(cases.likely().path, -offset).time == leg_to(cases.likely().path, offset).time);
            }
        }
    }
}

TEST_CASE("no path through a layer boundary is faster than the leg (Fermat)") {
    Path path;
    path.add(1.3e8, 0.5);
    path.add(0.7e8, 0.8);
    const double leg = leg_to(path, 1.1).time;
    double fastest = 1.0;
    for (int i = 0; i <= 20000; ++i) {
        const double x = 1.1 * i / 20000.0;
        const double t = std::hypot(x, 0.5) / 1.3e8 + std::hypot(1.1 - x, 0.8) / 0.7e8;
        CHECK(t >= leg * (1.0 - 1e-12));
        fastest = std::min(fastest, t);
    }
    CHECK(leg == doctest::Approx(fastest).epsilon(1e-8));
}

// Hyperbola of a round target, transmitter and receiver h either side of the middle: exact path over the rim by
// Fermat's rule, derived (geometry); the six printed digits allow 5e-5 ns, the two-leg search 2e-4 ns.
TEST_CASE("a round target's echo comes by the shortest way over its rim") {
    struct Row {
        double x, d, R, v, h, ns;
    };
    for (const Row& r :
         {Row{0, 1, 0.1, 0.1, 0, 20.0}, Row{0.5, 1, 0.1, 0.1, 0, 22.1661}, Row{1, 1, 0.1, 0.1, 0, 27.7321},
          Row{0, 1, 0.1, 0.1, 0.25, 20.6155}, Row{0.5, 1, 0.1, 0.1, 0.25, 22.6322}, Row{1, 1, 0.1, 0.1, 0.25, 27.9812},
          Row{0, 0.3, 0.15, 0.12, 0.1, 5.27046}}) {
        Plan plan = one_layer(r.v * 1e9, r.d, 2.0 * r.R, 4e8);
        plan.antenna.separation = 2.0 * r.h;
        const Cases cases = cases_of(plan);
        CHECK(echo_time(cases.likely(), r.x, r.R) * 1e9 == doctest::Approx(r.ns).epsilon(1e-5));
    }
}

// Same source: a point at the top.
TEST_CASE("a point's echo follows the hyperbola") {
    struct Row {
        double x, d, v, h, ns;
    };
    for (const Row& r : {Row{0.5, 1, 0.1, 0, 22.3607}, Row{1, 1, 0.1, 0, 28.2843}, Row{0.5, 1, 0.1, 0.25, 22.8078},
                         Row{1, 1, 0.1, 0.25, 28.5078}, Row{0, 0.3, 0.12, 0.1, 5.27046}}) {
        Plan plan = one_layer(r.v * 1e9, r.d, 0.1, 4e8);
        plan.antenna.separation = 2.0 * r.h;
        const Cases cases = cases_of(plan);
        CHECK(echo_time(cases.likely(), r.x, 0.0) * 1e9 == doctest::Approx(r.ns).epsilon(3e-6));
    }
}

TEST_CASE("the tabled curve keeps to the exact times between its points") {
    const Cases cases = cases_of(three_layers());
    const Case& c = cases.likely();
    const EchoCurve curve(c, 0.055, 1.5);
    for (double x = 0.0; x < 1.5; x += 0.013) {
        const double exact = echo_time(c, x, 0.055) - echo_time(c, 0.0, 0.055);
        CHECK(std::abs(curve.later(x) - exact) < 2e-3 * c.echo.width);
        CHECK(curve.later(-x) == curve.later(x));
    }
}

TEST_CASE("a leg is the same wherever its search starts") {
    const Cases cases = cases_of(three_layers());
    const Path& path = cases.likely().path;
    for (double offset : {0.0, 0.1, 2.0, 50.0}) {
        const Leg leg = leg_to(path, offset);
        for (double near : {0.1 * leg.tangent, leg.tangent, 1.1 * leg.tangent + 0.01, 100.0}) {
            const Leg other = leg_to(path, offset, near);
            CHECK(other.time == doctest::Approx(leg.time).epsilon(1e-12));
            CHECK(other.angle == doctest::Approx(leg.angle).epsilon(1e-6));
        }
    }
}

TEST_CASE("the offset where a delay is reached is found in few looks") {
    for (double start : {0.01, 0.3, 5.0}) {
        int looks = 0;
        const auto later = [&](double x) {
            ++looks;
            return std::sqrt(1.0 + x * x) - 1.0 + 0.1 * x * x * x;
        };
        const double goal = 0.25, x = offset_where(later, goal, start);
        CHECK(later(x) == doctest::Approx(goal).epsilon(1e-8));
        // Doubling from 0.01 takes seven of them; a search that stalls would take twenty more.
        CHECK(looks < 20);
    }
}

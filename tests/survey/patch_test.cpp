#include "survey/patch.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>

#include "setting.hpp"

using namespace gg;

namespace {

/// Travel time through two layers by trying where the boundary is crossed: slow, and nothing shared with leg_to().
double brute_time(const Path& p, double X) {
    if (p.count == 1) return std::hypot(X, p.thickness[0]) / p.speed[0];
    double best = 1.0;
    for (int i = 0; i <= 4000; ++i) {
        const double x = X * i / 4000.0;
        best =
            std::min(best, std::hypot(x, p.thickness[0]) / p.speed[0] + std::hypot(X - x, p.thickness[1]) / p.speed[1]);
    }
    return best;
}

}  // namespace

// sqrt(lambda d/2 + lambda^2/16), derived (geometry); depth, speed and frequency rows as in the survey-design rules of
// Annan & Cosway 1992, from memory. Six printed digits.
TEST_CASE("in one layer the lit patch is the straight-ray Fresnel zone") {
    struct Row {
        double mhz, K, d, radius;
    };
    for (const Row& r :
         {Row{50, 9, 10, 3.20156}, Row{100, 9, 5, 1.60078}, Row{100, 25, 5, 1.23390}, Row{200, 9, 3, 0.875},
          Row{500, 9, 1.5, 0.390512}, Row{1000, 6, 0.5, 0.177640}, Row{1600, 8, 0.3, 0.101086}}) {
        const double v = 3e8 / std::sqrt(r.K), f = r.mhz * 1e6;
        Path path;
        path.add(v, r.d);
        const Patch patch = lit_patch(path, 0.0, f);
        CHECK(patch.along == doctest::Approx(r.radius).epsilon(1e-5));
        CHECK(patch.across == doctest::Approx(r.radius).epsilon(1e-5));
        CHECK(fresnel_rule(r.d, v / f) == doctest::Approx(r.radius).epsilon(5e-6));
    }
}

// Annan & Cosway 1992, from memory: A = lambda/4 + d/sqrt(K+1), with c = 0.3 m/ns.
TEST_CASE("the published footprint has its published values") {
    struct Row {
        double mhz, K, d, A;
    };
    for (const Row& r :
         {Row{50, 9, 10, 3.66228}, Row{100, 9, 5, 1.83114}, Row{100, 25, 5, 1.13058}, Row{200, 9, 3, 1.07368},
          Row{500, 9, 1.5, 0.524342}, Row{1000, 6, 0.5, 0.219601}, Row{1600, 8, 0.3, 0.116573}}) {
        CHECK(footprint_rule(r.d, 300.0 / (r.mhz * std::sqrt(r.K)), r.K) == doctest::Approx(r.A).epsilon(5e-6));
    }
    CHECK(footprint_rule(0.0, 1.0, 9.0) == 0.0);
    CHECK(footprint_rule(1.0, 1.0, std::nan("")) == 0.0);
}

TEST_CASE("through two layers and with the antenna split, the patch's rim is half a period later by brute force") {
    Path path;
    path.add(1.4e8, 0.5);
    path.add(0.7e8, 0.6);
    for (double separation : {0.0, 0.16, 0.8}) {
        const double f = 4e8, h = 0.5 * separation;
        const Patch patch = lit_patch(path, separation, f);
        const double straight = 2.0 * brute_time(path, h);
        const double along = brute_time(path, std::abs(patch.along - h)) + brute_time(path, patch.along + h) - straight;
        const double across = 2.0 * brute_time(path, std::hypot(h, patch.across)) - straight;
        CHECK(along == doctest::Approx(0.5 / f).epsilon(1e-4));
        CHECK(across == doctest::Approx(0.5 / f).epsilon(1e-4));
        if (separation > 0.0) CHECK(patch.along > patch.across);
    }
}

TEST_CASE("a slow layer below narrows the patch against straight rays at the mean speed, a fast one widens it") {
    const double f = 4e8;
    Path down, up;
    down.add(1.4e8, 0.5), down.add(0.7e8, 0.5);
    up.add(0.7e8, 0.5), up.add(1.4e8, 0.5);
    const double rule = fresnel_rule(1.0, 1.0 / down.time_down() / f);
    CHECK(lit_patch(down, 0.0, f).along > rule);
    CHECK(lit_patch(down, 0.0, f).along == doctest::Approx(lit_patch(up, 0.0, f).along));
}

#include "survey/lines.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <random>

#include "setting.hpp"

using namespace gg;

namespace {

Plan yard(double spacing, double line_bearing, double target_bearing) {
    Plan plan = three_layers();
    plan.lanes.outline = {{0, 0}, {20, 0}, {20, 15}, {0, 15}};
    plan.lanes.spacing = spacing;
    plan.lanes.bearing = line_bearing;
    plan.target.bearing = target_bearing;
    plan.target.length = 1000.0;
    return plan;
}

bool in_box(SitePoint p) { return p.x > -1e-6 && p.x < 20 + 1e-6 && p.y > -1e-6 && p.y < 15 + 1e-6; }

}  // namespace

TEST_CASE("area and centroid are those of the shoelace formula, whatever the sense and wherever the site lies") {
    const std::vector<SitePoint> ell{{0, 0}, {4, 0}, {4, 1}, {1, 1}, {1, 3}, {0, 3}};
    CHECK(area_of(ell) == doctest::Approx(6.0));
    const SitePoint c = centroid_of(ell);
    CHECK(c.x == doctest::Approx(1.5));
    CHECK(c.y == doctest::Approx(1.0));
    std::vector<SitePoint> far(ell.rbegin(), ell.rend());
    for (SitePoint& p : far) p.x += 50000.0, p.y -= 70000.0;
    CHECK(area_of(far) == doctest::Approx(6.0));
    CHECK(centroid_of(far).x == doctest::Approx(50001.5));
    CHECK(area_of({}) == 0.0);
    CHECK(area_of({{1, 1}, {2, 2}}) == 0.0);
}

TEST_CASE("a line through a hollow site is cut into its stretches") {
    const std::vector<SitePoint> u{{0, 0}, {5, 0}, {5, 4}, {3, 4}, {3, 2}, {2, 2}, {2, 4}, {0, 4}};
    const auto low = inside(u, {-1, 1}, 1, 0), high = inside(u, {-1, 3}, 1, 0);
    REQUIRE(low.size() == 1);
    CHECK(low[0].first == doctest::Approx(1.0));
    CHECK(low[0].second == doctest::Approx(6.0));
    REQUIRE(high.size() == 2);
    CHECK(high[0].second == doctest::Approx(3.0));
    CHECK(high[1].first == doctest::Approx(4.0));
    CHECK(inside(u, {-1, 9}, 1, 0).empty());
}

TEST_CASE("lines stand at the spacing, centred, inside the site, to and fro") {
    const Walk walk = walk_of(yard(0.5, 0.0, 0.0));
    CHECK(walk.lines.size() == 41);  // 20 m at 0.5 m with both edges walked
    CHECK(walk.width == doctest::Approx(20.0));
    CHECK(walk.distance == doctest::Approx(41 * 15.0));
    for (std::size_t i = 0; i < walk.lines.size(); ++i) {
        const auto& line = walk.lines[i];
        CHECK(in_box(line.from));
        CHECK(in_box(line.to));
        CHECK((line.to.y > line.from.y) == (i % 2 == 0));
        CHECK(line.from.x == doctest::Approx(0.5 * static_cast<double>(i)).epsilon(1e-6));
    }
    CHECK(walk_of(yard(3.0, 0.0, 0.0)).lines.front().from.x == doctest::Approx(1.0));  // 7 lines over 18 m of 20
}

TEST_CASE("lines of any bearing cover the site's area over the spacing") {
    for (double bearing : {0.3, 1.0, 2.2, 2.9}) {
        const Walk walk = walk_of(yard(0.25, bearing, 0.0));
        CHECK(walk.distance == doctest::Approx(20.0 * 15.0 / 0.25).epsilon(0.02));
    }
}

TEST_CASE("an array walks fewer lines and keeps all its channels on the site") {
    Plan plan = yard(1.0, 0.0, 0.5 * pi);
    plan.antenna.channels = 5;
    plan.antenna.channel_spacing = 0.2;
    const Walk walk = walk_of(plan);
    CHECK(walk.lines.size() == 20);
    CHECK(walk.tracks.size() == 100);
    for (const auto& t : walk.tracks) CHECK(in_box(t.from));
    CHECK(widest_gap(1.0, 5, 0.2) == doctest::Approx(0.2));
    CHECK(widest_gap(1.5, 5, 0.2) == doctest::Approx(0.7));
    CHECK(widest_gap(0.5, 3, 0.4) == doctest::Approx(0.3));  // passes overlap: tracks at 0, 0.3 and 0.4
    CHECK(widest_gap(0.5, 1, 0.0) == doctest::Approx(0.5));
}

TEST_CASE("hits stand where each line crosses the target, at spacing over the sine of the angle") {
    for (double angle : {0.2, 0.7, 0.5 * pi, 2.5}) {
        const Plan plan = yard(0.5, 0.4, 0.4 + angle);
        const double between = distance_between_hits(plan);
        CHECK(between == doctest::Approx(0.5 / std::abs(std::sin(angle))));
        const Crossings c = crossings_of(plan, walk_of(plan));
        REQUIRE(c.hits.size() > 2);
        for (std::size_t i = 1; i < c.at.size(); ++i)
            CHECK(c.at[i] - c.at[i - 1] == doctest::Approx(between).epsilon(1e-6));
        for (const SitePoint& hit : c.hits) CHECK(in_box(hit));
    }
}

TEST_CASE("a target along the lines is never hit, and a second set of lines finds it") {
    Plan plan = yard(0.5, 0.6, 0.6);
    CHECK(distance_between_hits(plan) == 0.0);
    const Crossings none = crossings_of(plan, walk_of(plan));
    CHECK(none.hits.empty());
    CHECK(gaps_of(none, 1.0).size() == 1);
    plan.lanes.both_ways = true;
    CHECK(distance_between_hits(plan) == doctest::Approx(0.5));
    CHECK(crossings_of(plan, walk_of(plan)).hits.size() > 10);
}

TEST_CASE("what the hits do not light is a gap") {
    Crossings c;
    c.from = {0, 0};
    c.to = {10, 0};
    c.length = 10;
    c.at = {1, 2, 5, 9.8};
    const auto gaps = gaps_of(c, 2.0);  // each hit lights 1 m either way
    REQUIRE(gaps.size() == 2);
    CHECK(gaps[0].from.x == doctest::Approx(3.0));
    CHECK(gaps[0].to.x == doctest::Approx(4.0));
    CHECK(gaps[1].from.x == doctest::Approx(6.0));
    CHECK(gaps[1].to.x == doctest::Approx(8.8));
    CHECK(gaps_of(c, 5.0).empty());
}

TEST_CASE("a target shorter than the site keeps its length about the middle") {
    Plan plan = yard(0.5, 0.0, 0.5 * pi);
    plan.target.length = 4.0;
    const Crossings c = crossings_of(plan, walk_of(plan));
    CHECK(c.length == doctest::Approx(4.0));
    CHECK(0.5 * (c.from.x + c.to.x) == doctest::Approx(10.0));
    CHECK((c.hits.size() == 8 || c.hits.size() == 9));
}

// Buffon's needle, as in Uspensky 1937: expected crossings 2 L / (pi D), whatever the length.
TEST_CASE("short targets laid at random are crossed as often as Buffon's needle") {
    std::mt19937 random(7);
    std::uniform_real_distribution<double> unit(0.0, 1.0);
    for (double share : {0.5, 1.5}) {
        double hits = 0.0;
        const int tries = 3000;
        for (int i = 0; i < tries; ++i) {
            Plan plan = yard(1.0, 0.0, pi * unit(random));
            plan.target.length = share;
            // Moving the site under the lines moves the target between them.
            const double shift = unit(random);
            plan.lanes.outline = {{0, 0}, {20, 0}, {20, 15}, {0, 15}};
            Walk walk = walk_of(plan);
            for (auto& t : walk.tracks) t.from.x += shift, t.to.x += shift;
            hits += static_cast<double>(crossings_of(plan, walk).hits.size());
        }
        // Standard error of the mean is under 0.012.
        CHECK(hits / tries == doctest::Approx(2.0 * share / pi).epsilon(0.05));
    }
}

TEST_CASE("a site that is no area gives no lines and no gaps") {
    Plan plan = yard(0.5, 0.0, 1.0);
    for (const std::vector<SitePoint>& outline :
         {std::vector<SitePoint>{}, std::vector<SitePoint>{{1, 1}}, std::vector<SitePoint>{{0, 0}, {1, 1}, {2, 2}}}) {
        plan.lanes.outline = outline;
        const Walk walk = walk_of(plan);
        CHECK(walk.lines.empty());
        CHECK(crossings_of(plan, walk).hits.empty());
    }
}

#include "survey/sideways.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>

#include "setting.hpp"
#include "survey/answers.hpp"
#include "survey/downwards.hpp"

using namespace gg;

// sqrt(v r W/2), Annan & Cosway 1992, from memory, with v = 0.3/sqrt K m/ns and W = 1000/f ns.
TEST_CASE("the lateral rule has its published values") {
    struct Row {
        double mhz, K, d, dl;
    };
    for (const Row& r :
         {Row{50, 9, 10, 3.16228}, Row{100, 9, 5, 1.58114}, Row{100, 25, 5, 1.22474}, Row{200, 9, 3, 0.866025},
          Row{500, 9, 1.5, 0.387298}, Row{1000, 6, 0.5, 0.174982}, Row{1600, 8, 0.3, 0.0997180}}) {
        CHECK(lateral_rule(0.3e9 / std::sqrt(r.K), r.d, 1e-6 / r.mhz) == doctest::Approx(r.dl).epsilon(5e-6));
    }
    CHECK(lateral_rule(1e8, -1.0, 1e-9) == 0.0);
}

TEST_CASE("at the smallest gap the dip is Rayleigh's, and every wider gap keeps it") {
    for (double depth : {0.3, 0.9, 2.5}) {
        Plan plan = three_layers();
        plan.target.depth = exactly(depth);
        const Cases cases = cases_of(plan);
        const Case& c = cases.likely();
        const Value gap = smallest_gap(c, 0.02);
        REQUIRE(gap.ok());
        const EchoCurve curve(c, 0.02, 4.0 * gap.value);
        CHECK(pair_dip(c.echo, curve, gap.value) == doctest::Approx(apart_dip).epsilon(0.15));
        for (double wider = 1.05; wider < 2.0; wider += 0.05)
            CHECK(pair_dip(c.echo, curve, wider * gap.value) > apart_dip);
        CHECK(pair_dip(c.echo, curve, 0.9 * gap.value) < apart_dip);
    }
}

TEST_CASE("two part just where their dip is deep enough") {
    const Cases cases = cases_of(three_layers());
    const Case& c = cases.likely();
    const EchoCurve curve(c, 0.05, 2.0);
    int apart = 0;
    for (double gap = 0.02; gap < 1.2; gap += 0.01) {
        const bool parts = pair_parts(c.echo, curve, gap);
        CHECK(parts == (pair_dip(c.echo, curve, gap) >= apart_dip));
        apart += parts;
    }
    CHECK(apart > 10);
    CHECK(apart < 110);
}

TEST_CASE("deeper targets need more room, higher frequencies less, and it goes with the root of both") {
    const auto gap = [](double depth, double frequency) {
        const Cases cases = cases_of(one_layer(1e8, depth, 1e-3, frequency));
        return smallest_gap(cases.likely(), 0.0).value;
    };
    CHECK(gap(4.0, 4e8) / gap(1.0, 4e8) == doctest::Approx(2.0).epsilon(0.03));
    CHECK(gap(1.0, 4e8) / gap(1.0, 16e8) == doctest::Approx(2.0).epsilon(0.05));
    // No finer than the rule's root, no coarser than twice and a half of it.
    const double rule = lateral_rule(1e8, 1.0, 1.0 / 4e8);
    CHECK(gap(1.0, 4e8) > rule);
    CHECK(gap(1.0, 4e8) < 2.5 * rule);
}

TEST_CASE("targets never part before they stop touching") {
    const Cases cases = cases_of(one_layer(1e8, 0.1, 2.0, 2e9));
    CHECK(smallest_gap(cases.likely(), 1.0).value >= 2.0);
}

TEST_CASE("the verdict follows the gap: one, merging, apart") {
    Plan plan = three_layers();
    plan.target.depth = exactly(0.9);
    const double least = answers_for(plan).find("apart.sideways")->likely.value;
    const auto verdict = [&](double share) {
        plan.target.gap = share * least;
        return answers_for(plan).pair.verdict;
    };
    using Verdict = PairPicture::Verdict;
    CHECK(verdict(0.3) == Verdict::one);
    CHECK(verdict(0.9) == Verdict::merging);
    CHECK(verdict(1.1) == Verdict::apart);
    CHECK(verdict(3.0) == Verdict::apart);
}

TEST_CASE("the pair's picture is symmetric, peaks at 1 and its arrivals are hyperbolas over each target") {
    const Plan plan = three_layers();
    const PairPicture pair = answers_for(plan).pair;
    const std::size_t n = pair.positions.size();
    REQUIRE(n > 20);
    CHECK(pair.arrival_left.size() == n);
    CHECK(pair.response.size() == n);
    double peak = 0.0;
    for (std::size_t i = 0; i < n; ++i) {
        peak = std::max(peak, pair.response[i]);
        CHECK(pair.response[i] == doctest::Approx(pair.response[n - 1 - i]).epsilon(1e-6));
        CHECK(pair.arrival_left[i] == doctest::Approx(pair.arrival_right[n - 1 - i]).epsilon(1e-9));
    }
    CHECK(peak == doctest::Approx(1.0));
    const auto first = std::min_element(pair.arrival_left.begin(), pair.arrival_left.end());
    CHECK(pair.positions[static_cast<std::size_t>(first - pair.arrival_left.begin())] ==
          doctest::Approx(pair.first).epsilon(0.05));
}

#include "survey/section.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>

#include "setting.hpp"
#include "wave/fourier.hpp"

using namespace gg;

namespace {

/// Two metal bars in soil of relative permittivity 9, quick to compute.
Plan bars(double gap) {
    Plan plan = one_layer(1e8, 0.3, 0.02, 900e6);
    plan.ground = {own_layer(9.0, 0.001, 100.0)};
    plan.target.filling = Filling::metal;
    plan.target.gap = gap;
    plan.antenna.separation = 0.08;
    plan.pass.step = 0.01;
    plan.pass.window = 16e-9;
    plan.pass.samples = 256;
    return plan;
}

}  // namespace

TEST_CASE("the section is sampled as the pass is keyed in, evenly about the targets, and holds their hyperbolas") {
    const Plan plan = three_layers();
    for (const Detail detail : {Detail::full, Detail::exact}) {
        const Scene scene = scene_for(plan, detail);
        const Sampling& s = scene.sampling;
        CHECK(s.step == doctest::Approx(plan.pass.step));
        CHECK(s.window / s.samples == doctest::Approx(plan.pass.window / plan.pass.samples).epsilon(1e-12));
        CHECK(s.first == doctest::Approx(-0.5 * (s.traces - 1) * s.step));
        CHECK(-s.first >= 0.5 * plan.target.gap + plan.target.depth.likely);
        CHECK(s.samples <= plan.pass.samples);
        CHECK(fault_of(scene).empty());
    }
    CHECK(scene_for(plan, Detail::exact).sampling.samples == plan.pass.samples);
    // The full one ends only after the farthest flank is in.
    const Scene full = scene_for(plan);
    const double flank = arrivals_at(plan, {0.5 * plan.target.gap - full.sampling.first}).front();
    CHECK(full.sampling.window >= std::min(plan.pass.window, flank));
    CHECK(scene_for(plan, Detail::coarse).sampling.traces < full.sampling.traces);
    CHECK(scene_for(plan, Detail::coarse).sampling.traces > 20);
}

TEST_CASE("a window that ends early, and a step too coarse, stay so") {
    Plan plan = bars(0.2);
    plan.pass.window = 3e-9;
    plan.pass.step = 0.1;
    const Scene scene = scene_for(plan);
    CHECK(scene.sampling.window == doctest::Approx(3e-9));
    CHECK(scene.sampling.samples == 256);
    CHECK(scene.sampling.step == doctest::Approx(0.1));
}

TEST_CASE("a step much finer than the wave asks for is thinned, never past a quarter of the shortest wave") {
    Plan plan = bars(0.2);
    plan.pass.step = 0.0005;
    const Scene full = scene_for(plan), exact = scene_for(plan, Detail::exact);
    CHECK(exact.sampling.step == doctest::Approx(0.0005));
    CHECK(exact.sampling.traces > 1000);
    CHECK(full.sampling.traces <= 512);
    CHECK(full.sampling.step <= 0.25 * 1e8 / band_of(full.pulse).high);
    CHECK(full.sampling.first == doctest::Approx(exact.sampling.first).epsilon(0.02));
    // Where a wide line would take more traces than are drawn, it is the line that is cut.
    plan.pass.step = 0.01;
    plan.target.gap = 8.0;
    const Scene wide = scene_for(plan);
    CHECK(wide.sampling.traces <= 512);
    CHECK(wide.sampling.step <= 0.25 * 1e8 / band_of(wide.pulse).high);
}

TEST_CASE("targets stand side by side at the gap, at most six, two neighbours in the middle first") {
    Plan plan = bars(0.2);
    for (const int count : {1, 2, 3, 4, 6, 12}) {
        plan.target.count = count;
        const Scene scene = scene_for(plan);
        CHECK(scene.targets.size() == static_cast<std::size_t>(std::min(count, 6)));
        double sum = 0.0;
        for (const RoundTarget& t : scene.targets) {
            sum += t.x;
            CHECK(t.depth - t.radius == doctest::Approx(plan.target.depth.likely));
            CHECK(t.radius == doctest::Approx(0.5 * plan.target.size));
        }
        CHECK(std::abs(sum) < 1e-12);
        if (count < 2) continue;
        CHECK(scene.targets[1].x - scene.targets[0].x == doctest::Approx(0.2));
        CHECK(std::abs(scene.targets[0].x + scene.targets[1].x) <= 0.2 + 1e-9);
    }
    CHECK(as_pair(bars(0.2)).target.count == 2);
    plan.target.count = 1;
    CHECK(as_pair(plan).target.count == 2);
}

TEST_CASE("a plastic pipe has a wall of a twentieth of its diameter, other targets none") {
    Plan plan = bars(0.2);
    CHECK_FALSE(scene_for(plan).targets[0].wall.has_value());
    CHECK(scene_for(plan).targets[0].inside.model == Model::metal);
    plan.target.filling = Filling::plastic_water;
    const auto wall = scene_for(plan).targets[0].wall;
    REQUIRE(wall.has_value());
    CHECK(wall->thickness == doctest::Approx(0.001));
    CHECK(permittivity(wall->material, 900e6).value.real() == doctest::Approx(2.3));
    plan.target.filling = Filling::air;
    CHECK_FALSE(scene_for(plan).targets[0].wall.has_value());
}

TEST_CASE("what cannot be computed is refused with a sentence, and what is like it is not") {
    Plan plan = bars(0.2);
    CHECK(section_fault(plan).empty());
    CHECK(section_for(plan, Detail::coarse).ok());
    plan.target.shape = TargetShape::flat;
    CHECK(section_fault(plan).find("round") != std::string::npos);
    const Section refused = section_for(plan);
    CHECK_FALSE(refused.ok());
    CHECK(refused.targets.empty());
    CHECK(refused.reason == section_fault(plan));
    plan.target.shape = TargetShape::compact;
    CHECK(section_fault(plan).empty());
    plan.target.gap = 0.015;
    CHECK(section_fault(plan).find("overlap") != std::string::npos);
    plan = bars(0.2);
    plan.ground = {own_layer(9.0, 0.001, 0.31), own_layer(4.0, 0.0, 1.0)};
    CHECK(section_fault(plan).find("straddles") != std::string::npos);
    CHECK(turning_for(plan).words.empty());
    CHECK(separation_for(plan).least_raw.issue == Issue::out_of_range);
}

TEST_CASE("plans at the edge of sense and beyond it give finite numbers or a sentence") {
    const double nan = std::nan("");
    for (auto change : {+[](Plan&p, double) { p.ground.clear(); },
                        +[](Plan&p, double x) { p.target.depth = exactly(x), p.target.size = x; },
                        +[](Plan&p, double x) { p.pass.step = x, p.pass.window = x; },
                        +[](Plan&p, double x) { p.antenna.pulse.centre_frequency = x; },
                        +[](Plan&p, double) { p.pass.samples = 65536; }, +[](Plan&p, double) { p.pass.step = 50.0; },
                        +[](Plan&p, double) { p.target.size = 30.0; }}) {
        for (const double x : {nan, 0.0, -1.0, HUGE_VAL}) {
            Plan plan = bars(0.2);
            change(plan, x);
            const Scene scene = scene_for(plan, Detail::coarse);
            CHECK(std::isfinite(scene.sampling.first + scene.sampling.step + scene.sampling.window));
            const std::vector<double> gain = even_gain(scene);
            CHECK(std::all_of(gain.begin(), gain.end(), [](double g) { return std::isfinite(g); }));
            const Turning turning = turning_for(plan);
            CHECK(std::isfinite(turning.along_db));
            CHECK(turning.words.empty() == !section_fault(plan).empty());
        }
    }
}

TEST_CASE("the section's echoes stand where the travel times say") {
    for (const Polarisation polarisation : {Polarisation::along, Polarisation::across}) {
        Plan plan = bars(0.2);
        plan.target.count = 1;
        const Scene scene = scene_for(plan, Detail::full, polarisation);
        const Section section = section_of(scene);
        REQUIRE(section.ok());
        for (const double x : {0.0, 0.1, 0.25}) {
            const int trace = static_cast<int>(std::lround((x - section.first) / section.step));
            const auto from = section.targets.begin() + static_cast<std::ptrdiff_t>(trace) * section.samples;
            const std::vector<double> e = envelope(std::vector<double>(from, from + section.samples));
            const double peak =
                section.start + section.dt * static_cast<double>(std::max_element(e.begin(), e.end()) - e.begin());
            // A tenth of a period: in two dimensions the pulse is carried on by half an integration.
            CHECK(std::abs(peak - arrivals_at(plan, {x}).front()) < 0.2e-9);
        }
    }
}

TEST_CASE("even gain gives back what the ground takes and the spreading, and is one at the target") {
    Plan plan = bars(0.2);
    plan.ground = {own_layer(9.0, 0.02, 100.0)};
    const Scene scene = scene_for(plan);
    const std::vector<double> gain = even_gain(scene);
    REQUIRE(gain.size() == static_cast<std::size_t>(scene.sampling.samples));
    const PlaneWave wave = plane_wave(scene.ground.slabs[0].material, 900e6);
    const double dt = scene.sampling.window / scene.sampling.samples;
    const auto at_depth = [&](double depth) {
        return gain[static_cast<std::size_t>(std::lround(2.0 * depth / wave.speed / dt))];
    };
    CHECK(at_depth(0.3) == doctest::Approx(1.0).epsilon(0.02));
    CHECK(at_depth(0.6) == doctest::Approx(2.0 * std::exp(2.0 * wave.attenuation * 0.3)).epsilon(0.03));
    CHECK(std::is_sorted(gain.begin(), gain.end()));
    plan.ground = {own_layer(9.0, 5.0, 100.0)};
    const std::vector<double> held = even_gain(scene_for(plan));
    CHECK(held.back() / held.front() == doctest::Approx(1e4).epsilon(1e-6));
}

// The limit of a thin cylinder, from the leading terms of its series (textbook: Balanis 1989 ch. 11, title from
// memory): along (n - 1) of the monopole, across 2 (n - 1) / (n + 1) of the dipole, n the ratio of permittivities.
TEST_CASE("a thin void answers the field across it more, by (n + 1) / 2") {
    Plan plan = bars(0.2);
    plan.ground = {own_layer(9.0, 0.0, 100.0)};
    plan.target.filling = Filling::air;
    plan.target.size = 0.001;
    const Turning turning = turning_for(plan);
    CHECK(turning.along_db == doctest::Approx(20.0 * std::log10(0.5 * (1.0 + 1.0 / 9.0))).epsilon(0.01));
    CHECK(turning.better == Polarisation::across);
    CHECK(turning.words.find("across the void") != std::string::npos);
}

TEST_CASE("a thin bar answers the field along it, a wide one either way, and a compact target has no along") {
    Plan plan = bars(0.2);
    plan.target.size = 0.004;
    CHECK(turning_for(plan).along_db > 10.0);
    CHECK(turning_for(plan).words.find("along the bar") != std::string::npos);
    plan.target.size = 2.0;
    plan.target.gap = 3.0;
    CHECK(std::abs(turning_for(plan).along_db) < 1.0);
    CHECK(turning_for(plan).words.find("both") != std::string::npos);
    plan.target.shape = TargetShape::compact;
    CHECK(turning_for(plan).words.find("no long side") != std::string::npos);
}

TEST_CASE("two are told apart at gaps above the measured least one and not below it") {
    const Separation far = separation_for(bars(0.6));
    REQUIRE(far.least_raw.ok());
    REQUIRE(far.least_focused.ok());
    CHECK(far.raw.apart());
    CHECK(far.focused.apart());
    CHECK(far.least_focused.value <= far.least_raw.value);  // that is what focusing is for
    CHECK(separation_for(bars(1.1 * far.least_raw.value)).raw.apart());
    CHECK_FALSE(separation_for(bars(0.8 * far.least_raw.value)).raw.apart());
}

TEST_CASE("a range is what the same search finds at the ends of the ground and the depth") {
    Plan plan = bars(0.2);
    plan.ground = {own_layer(9.0, 0.005, 100.0)};
    plan.ground[0].matter.inputs[Input::permittivity] = {6.0, 9.0, 14.0};
    plan.target.depth = {0.25, 0.3, 0.4};
    plan.target.filling = Filling::plastic_air;
    Separation found;
    add_ranges(found, plan);
    CHECK(found.known == Separation::Known::all);
    const auto least = [&](double permittivity, double depth, Reading reading) {
        Plan other = plan;
        other.ground = {own_layer(permittivity, 0.005, 100.0)};
        other.target.depth = exactly(depth);
        return smallest_gap(scene_for(other), reading).value;
    };
    for (const Reading reading : {Reading::raw, Reading::focused}) {
        const Spread& spread = reading == Reading::raw ? found.range_raw : found.range_focused;
        REQUIRE(spread.likely.ok());
        CHECK(spread.likely.value == doctest::Approx(least(9.0, 0.3, reading)).epsilon(0.001));
        CHECK(spread.low <= least(14.0, 0.25, reading) * 1.001);
        CHECK(spread.high >= least(6.0, 0.4, reading) * 0.999);  // faster and deeper: farther apart
        CHECK(spread.high > spread.low);
    }
    REQUIRE(found.above.likely.ok());
    CHECK(found.above.likely == smallest_drop(scene_for(plan)));
    CHECK(found.through.likely == smallest_diameter(scene_for(plan)));
    CHECK(found.above.high >= found.above.likely.value);
}

TEST_CASE("a longer record, and larger or more targets, take more effort") {
    const Plan plan = bars(0.2);
    const double effort = section_effort(scene_for(plan));
    Plan other = plan;
    other.target.depth = exactly(3.0);
    other.pass.window = 160e-9;
    CHECK(section_effort(scene_for(other)) > 10.0 * effort);
    other = plan;
    other.target.count = 6;
    other.target.gap = 3.0;
    other.target.size = 2.0;
    CHECK(section_effort(scene_for(other)) > 10.0 * effort);
}

TEST_CASE("the coarse section is the full one to a percent, where both have a trace and a sample") {
    Plan plan = three_layers();
    plan.pass.step = 0.01;
    const Section full = section_for(plan), coarse = section_for(plan, Detail::coarse);
    REQUIRE((full.ok() && coarse.ok()));
    CHECK(coarse.samples < full.samples);
    CHECK(coarse.dt == doctest::Approx(full.dt));
    double strongest = 0.0, worst = 0.0;
    int compared = 0;
    for (int i = 0; i < coarse.traces; ++i) {
        const double place = (coarse.first + i * coarse.step - full.first) / full.step;
        const int trace = static_cast<int>(std::lround(place));
        if (std::abs(place - trace) > 1e-6) continue;
        ++compared;
        for (int k = 0; k < coarse.samples; ++k) {
            strongest = std::max(strongest, std::abs(full.at(trace, k)));
            worst = std::max(worst, std::abs(full.at(trace, k) - coarse.at(i, k)));
        }
    }
    CHECK(compared == coarse.traces);
    CHECK(worst < 0.01 * strongest);
}

TEST_CASE("what was measured takes the place of what travel times tell, which stays beside it") {
    const Plan plan = bars(0.2);
    const Answers quick = answers_for(plan), full = settled_answers_for(plan);
    const Answer &before = *quick.find("apart.sideways"), &after = *full.find("apart.sideways");
    REQUIRE(full.find("apart.focused"));
    CHECK(full.list.size() == quick.list.size() + 2);  // focused, and one above the other; a bar has no inside
    const Separation measured = separation_for(plan);
    CHECK(after.likely == measured.least_raw);
    CHECK(full.find("apart.focused")->likely == measured.least_focused);
    CHECK(after.rules.back().value == before.likely.value);
    CHECK(after.low <= after.likely.value);
    CHECK(after.high >= after.likely.value);
    CHECK(full.pair.verdict != PairPicture::Verdict::one);  // 0.2 m at 0.3 m depth part at least once focused

    Answers twice = full;
    settle(twice, plan, measured);
    CHECK(twice.list.size() == full.list.size());

    // In two steps, as a screen does it: at first with the range of the travel times.
    Answers stepwise = quick;
    settle(stepwise, plan, measured);
    const Answer first = *stepwise.find("apart.sideways");
    CHECK(first.low / first.likely.value == doctest::Approx(before.low / before.likely.value));
    CHECK_FALSE(stepwise.find("apart.above"));
    Separation ranged = measured;
    add_ranges(ranged, plan);
    settle(stepwise, plan, ranged);
    CHECK(stepwise.list.size() == full.list.size());
    for (std::size_t i = 0; i < full.list.size(); ++i) {
        CHECK(stepwise.list[i].key == full.list[i].key);
        CHECK(stepwise.list[i].why == full.list[i].why);
        CHECK(stepwise.list[i].formula == full.list[i].formula);
        CHECK(stepwise.list[i].high == full.list[i].high);
    }

    Plan flat = plan;
    flat.target.shape = TargetShape::flat;
    CHECK_FALSE(settled_answers_for(flat).find("apart.focused"));
}

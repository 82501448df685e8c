// Orders for Pair's section and their answers, there and back as bytes.
#include "paper/pair_desk.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <random>

#include "paper/plan_file.hpp"

using namespace gg;

namespace {

/// A plan whose section takes a millisecond or two.
Plan quick_plan() {
    Plan plan;
    plan.ground = {{matter_of("own"), exactly(1.0)}};
    plan.target.size = 0.1;
    plan.target.depth = exactly(0.4);
    plan.target.gap = 0.5;
    plan.antenna.pulse.centre_frequency = 400e6;
    plan.antenna.separation = 0.1;
    plan.pass.step = 0.05;
    plan.pass.window = 20e-9;
    plan.pass.samples = 128;
    return plan;
}

PairAnswer asked(PairDesk& desk, const Plan& plan, PairStep step, std::uint32_t number = 7) {
    const auto answer = read_answer(desk.answer(write_order({number, step, Polarisation::along, plan})));
    REQUIRE(answer);
    CHECK(answer->number == number);
    CHECK(answer->step == step);
    return *answer;
}

void same_but_for_rounding(const std::vector<double>& a, const std::vector<double>& b) {
    REQUIRE(a.size() == b.size());
    for (std::size_t i = 0; i < a.size(); ++i) CHECK(a[i] == static_cast<double>(static_cast<float>(b[i])));
}

void same(const Dip& a, const Dip& b) {
    CHECK(a.first == b.first);
    CHECK(a.second == b.second);
    CHECK(a.lower_peak == b.lower_peak);
    CHECK(a.depth == b.depth);
    CHECK(a.needed == b.needed);
}

}  // namespace

TEST_CASE("an order reads back as written, and anything else is refused") {
    const PairOrder order{4000000000u, PairStep::searched, Polarisation::across, quick_plan()};
    const std::string bytes = write_order(order);
    REQUIRE(read_order(bytes));
    CHECK(*read_order(bytes) == order);
    for (const char* wrong : {"", "pair", "pair 1 2 0", "pair 1 2\n{}", "pair 1 7 0\n", "pair 1 2 2\n", "pair -1 2 0\n",
                              "pair 1  2 0\n", "pair 1 2 0 0\n", "order 1 2 0\n", "pair 99999999999 2 0\n"}) {
        INFO(wrong);
        CHECK(!read_order(std::string(wrong) + bytes.substr(bytes.find('\n') + 1)));
        CHECK(PairDesk().answer(wrong).empty());
    }
    CHECK(!read_order("pair 1 2 0\n{]"));
}

TEST_CASE("the desk's steps give the section, its focused picture and its separation as computed directly") {
    const Plan plan = quick_plan();
    PairSection direct = pair_section(plan, Detail::full, Polarisation::along);
    add_focused(direct);
    add_separation(direct, plan);
    REQUIRE(direct.section.ok());

    PairDesk desk;
    const PairSection full = asked(desk, plan, PairStep::full).pair;
    CHECK(full.detail == Detail::full);
    CHECK(full.section.traces == direct.section.traces);
    CHECK(full.section.samples == direct.section.samples);
    CHECK(full.section.first == direct.section.first);
    CHECK(full.section.step == direct.section.step);
    CHECK(full.section.start == direct.section.start);
    CHECK(full.section.dt == direct.section.dt);
    CHECK(full.section.issue == direct.section.issue);
    same_but_for_rounding(full.section.targets, direct.section.targets);
    same_but_for_rounding(full.section.layers, direct.section.layers);
    same_but_for_rounding(full.section.direct, direct.section.direct);
    same_but_for_rounding(full.section.noise, direct.section.noise);
    same_but_for_rounding(full.arrivals, direct.arrivals);
    same_but_for_rounding(full.gain, direct.gain);
    CHECK(full.turning.along_db == direct.turning.along_db);
    CHECK(full.turning.better == direct.turning.better);
    CHECK(full.turning.words == direct.turning.words);
    CHECK(!full.separation);

    const PairSection focused = asked(desk, plan, PairStep::focused).pair;
    CHECK(focused.section.targets.empty());  // only what is new crosses
    CHECK(focused.focused.rows == direct.focused.rows);
    CHECK(focused.focused.traces == direct.focused.traces);
    CHECK(focused.focused.spacing == direct.focused.spacing);
    CHECK(focused.focused.peak == direct.focused.peak);
    same_but_for_rounding(focused.focused.values, direct.focused.values);
    same_but_for_rounding(focused.focused_gain, direct.focused_gain);

    const PairSection raw = asked(desk, plan, PairStep::raw).pair;
    REQUIRE(raw.separation);
    CHECK(raw.separation->known == Separation::Known::raw);
    same(raw.separation->raw, direct.separation->raw);
    CHECK(raw.separation->least_raw == direct.separation->least_raw);

    PairDesk fresh;  // one that saw none of the steps before gives the same
    for (PairDesk* at : {&desk, &fresh}) {
        const PairSection likely = asked(*at, plan, PairStep::likely).pair;
        REQUIRE(likely.separation);
        CHECK(likely.separation->known == Separation::Known::likely);
        same(likely.separation->raw, direct.separation->raw);
        same(likely.separation->focused, direct.separation->focused);
        CHECK(likely.separation->least_raw == direct.separation->least_raw);
        CHECK(likely.separation->least_focused == direct.separation->least_focused);
    }
    Separation ranged = *direct.separation;
    add_ranges(ranged, plan);
    const PairSection all = asked(desk, plan, PairStep::all).pair;
    REQUIRE(all.separation);
    CHECK(all.separation->known == Separation::Known::all);
    CHECK(all.separation->least_raw == ranged.least_raw);
    using Ranged = Spread Separation::*;
    for (const Ranged spread :
         {&Separation::range_raw, &Separation::range_focused, &Separation::above, &Separation::through}) {
        CHECK(((*all.separation).*spread).likely == (ranged.*spread).likely);
        CHECK(((*all.separation).*spread).low == (ranged.*spread).low);
        CHECK(((*all.separation).*spread).high == (ranged.*spread).high);
    }
}

TEST_CASE("a coarse section comes with the raw dip at the plan's gap, and on demand the gap that parts") {
    PairDesk desk;
    const Plan plan = quick_plan();
    const PairSection coarse = asked(desk, plan, PairStep::coarse).pair;
    CHECK(coarse.detail == Detail::coarse);
    REQUIRE(coarse.separation);
    CHECK(coarse.separation->known == Separation::Known::dip);
    same(coarse.separation->raw, raw_dip(scene_for(plan)));
    const PairSection searched = asked(desk, plan, PairStep::searched).pair;
    REQUIRE(searched.separation);
    CHECK(searched.separation->known == Separation::Known::raw);
    CHECK(searched.separation->least_raw == smallest_gap(scene_for(plan), Reading::raw));
}

TEST_CASE("the least gaps are searched once for all gaps of a plan, and hold for each") {
    PairDesk desk;
    Plan plan = quick_plan();
    plan.pass.step = 0.02;
    const Separation once = *asked(desk, plan, PairStep::all).pair.separation;
    REQUIRE(once.least_raw.ok());
    REQUIRE(once.least_focused.ok());
    for (const double gap : {0.15, 0.25, 0.7}) {
        plan.target.gap = gap;
        const Separation fresh = separation_for(plan), held = *asked(desk, plan, PairStep::coarse).pair.separation,
                         rested = *asked(desk, plan, PairStep::raw).pair.separation;
        for (const Separation& s : {held, rested}) {
            CHECK(s.known == once.known);
            CHECK(s.least_raw == fresh.least_raw);
            CHECK(s.least_focused == fresh.least_focused);
            CHECK(verdict_of(s, gap) == verdict_of(fresh, gap));
        }
        same(held.raw, raw_dip(scene_for(plan)));
        same(rested.raw, fresh.raw);
        same(rested.focused, fresh.focused);
    }
    plan.target.depth = exactly(0.5);
    CHECK(asked(desk, plan, PairStep::coarse).pair.separation->known == Separation::Known::dip);
}

TEST_CASE("a step of another plan, or of the field turned, does not build on the section before") {
    PairDesk desk;
    Plan plan = quick_plan();
    (void)asked(desk, plan, PairStep::full);
    plan.target.gap = 0.7;
    const PairSection moved = asked(desk, plan, PairStep::all).pair;
    CHECK(moved.separation->raw.second - moved.separation->raw.first == doctest::Approx(0.7).epsilon(0.1));
    const auto across = read_answer(desk.answer(write_order({1, PairStep::all, Polarisation::across, plan})));
    REQUIRE(across);
    CHECK(across->pair.separation->raw.depth == separation_for(plan, Polarisation::across).raw.depth);
}

TEST_CASE("what has no section says why, and what is too much for a screen, too") {
    PairDesk desk;
    Plan flat = quick_plan();
    flat.target.shape = TargetShape::flat;
    const PairSection none = asked(desk, flat, PairStep::full).pair;
    CHECK(!none.section.ok());
    CHECK(none.section.reason == section_fault(flat));
    CHECK(!asked(desk, flat, PairStep::all).pair.separation);

    Plan heavy = quick_plan();
    heavy.target.depth = exactly(15.0);
    heavy.antenna.pulse.centre_frequency = 2e9;
    heavy.pass.window = 400e-9;
    heavy.pass.samples = 8192;
    REQUIRE(section_fault(as_pair(heavy)).empty());
    CHECK(asked(desk, heavy, PairStep::full).pair.section.reason.find("too long for a screen") != std::string::npos);
}

TEST_CASE("answers that are cut short, too long or garbled are refused, or are sound all the same") {
    PairDesk desk;
    for (const PairStep step : {PairStep::coarse, PairStep::full, PairStep::focused, PairStep::all}) {
        const std::string whole = desk.answer(write_order({3, step, Polarisation::along, quick_plan()}));
        REQUIRE(read_answer(whole));
        for (std::size_t length = 0; length < whole.size(); length += 1 + length / 50)
            CHECK(!read_answer(std::string_view(whole).substr(0, length)));
        CHECK(!read_answer(whole + "x"));
        std::mt19937 random(1);
        for (int i = 0; i < 2000; ++i) {
            std::string odd = whole;
            // The first bytes say how much is to come: half of the garbling goes there.
            const std::size_t reach = i % 2 ? odd.size() : std::min<std::size_t>(odd.size(), 120);
            for (int n = 0; n <= i % 3; ++n) odd[random() % reach] = static_cast<char>(random());
            const auto read = read_answer(odd);
            if (!read || read->step > PairStep::full || !read->pair.section.ok()) continue;
            const Section& s = read->pair.section;
            CHECK(s.targets.size() == static_cast<std::size_t>(s.traces) * static_cast<std::size_t>(s.samples));
            CHECK(std::all_of(s.targets.begin(), s.targets.end(), [](double v) { return std::isfinite(v); }));
        }
    }
    for (const char* wrong : {"", "gg-pair", "gg-pair\n", "{}", "gg-pair\n\xff\xff\xff\xff\xff\xff\xff\xff\xff\xff"})
        CHECK(!read_answer(wrong));
}

TEST_CASE("in the demo plans the raw section parts two where travel times say, to a fifth, and focusing does sooner") {
    // Two ways that share nothing but the ground: Maxwell's equations with a dip of 5 percent, and refracted rays with
    // the returned pulse and a dip of 19 percent.
    for (const Demo& demo : demos()) {
        CAPTURE(demo.name);
        const Plan plan = read_plan(demo.json).plan;
        const Answers answers = settled_answers_for(plan);
        const Answer* sideways = answers.find("apart.sideways");
        REQUIRE(sideways);
        REQUIRE(sideways->likely.ok());
        const double travel = sideways->rules.back().value, ratio = sideways->likely.value / travel;
        CHECK(ratio > 0.8);
        CHECK(ratio < 1.2);
        REQUIRE(answers.find("apart.focused"));
        CHECK(answers.find("apart.focused")->likely.value < 0.7 * sideways->likely.value);
        const bool apart = plan.target.count > 1 && plan.target.gap >= sideways->likely.value;
        CHECK((answers.pair.verdict == PairPicture::Verdict::apart) == apart);
    }
}

#include "survey/answers.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <set>

#include "setting.hpp"

using namespace gg;

namespace {

const Answer& get(const Answers& answers, const char* key) {
    const Answer* a = answers.find(key);
    REQUIRE_MESSAGE(a != nullptr, key);
    return *a;
}

bool says(const Answer& a, const char* words) { return a.why.find(words) != std::string::npos; }

}  // namespace

TEST_CASE("every promised answer is there once, whole and in order") {
    const Answers answers = answers_for(three_layers());
    std::set<std::string> keys;
    for (const Answer& a : answers.list) {
        CHECK_MESSAGE(keys.insert(a.key).second, a.key);
        CHECK_MESSAGE(!a.name.empty(), a.key);
        CHECK_MESSAGE(!a.why.empty(), a.key);
        CHECK_MESSAGE(!a.formula.empty(), a.key);
        CHECK_MESSAGE(a.low <= a.likely.value, a.key);
        CHECK_MESSAGE(a.likely.value <= a.high, a.key);
        for (const Rule& r : a.rules) CHECK_MESSAGE(!r.source.empty(), a.key);
    }
    for (const char* key :
         {"layer.0.speed", "layer.1.wavelength", "layer.2.attenuation", "layer.0.time",     "layer.2.skin",
          "target.time",   "target.loss",        "target.width",        "target.frequency", "patch.along",
          "patch.across",  "apart.down",         "apart.sideways",      "smallest",         "pass.step",
          "pass.window",   "pass.interval",      "pass.samples",        "pass.hits",        "pass.per_cycle",
          "pass.error",    "pass.reach",         "lanes.between_hits",  "lanes.hits",       "lanes.picture",
          "lanes.swath"}) {
        CHECK_MESSAGE(keys.count(key) == 1, key);
    }
}

TEST_CASE("a plan without unknowns has answers without width, and an unknown widens them") {
    Plan plan = three_layers();
    for (Layer& layer : plan.ground) {
        for (int i = 0; i < input_count; ++i) {
            Range& r = layer.matter.inputs[static_cast<Input>(i)];
            r = exactly(r.likely);
        }
        layer.thickness = exactly(layer.thickness.likely);
    }
    plan.target.depth = exactly(0.9);
    for (const Answer& a : answers_for(plan).list) {
        if (a.key == "smallest") continue;  // its low end is the tenth of a wavelength
        CHECK_MESSAGE(a.low == a.high, a.key);
    }
    const Answers wide = answers_for(three_layers());
    for (const char* key :
         {"target.time", "target.loss", "patch.along", "apart.down", "apart.sideways", "pass.window"}) {
        CHECK_MESSAGE(get(wide, key).low < get(wide, key).high, key);
    }
}

TEST_CASE("the range holds what any ground within the inputs' ranges gives") {
    const Plan plan = three_layers();
    const Answers wide = answers_for(plan);
    for (int pick = 0; pick < 8; ++pick) {
        Plan one = plan;
        int bit = pick;
        for (Layer& layer : one.ground) {
            for (Range* r : {&layer.matter.inputs[Input::permittivity], &layer.thickness}) {
                *r = exactly((bit & 1) != 0 ? r->high : r->low);
                bit >>= 1;
            }
            layer.matter.inputs[Input::conductivity] = exactly(layer.matter.inputs[Input::conductivity].likely);
        }
        one.target.depth = exactly((pick & 4) != 0 ? 1.1 : 0.8);
        const Answers a = answers_for(one);
        for (const char* key : {"target.time", "patch.across", "layer.1.speed"}) {
            const Answer &w = get(wide, key), &n = get(a, key);
            CHECK_MESSAGE(n.likely.value >= w.low * (1.0 - 1e-9), key);
            CHECK_MESSAGE(n.likely.value <= w.high * (1.0 + 1e-9), key);
        }
    }
}

// Common practice, no source: a one-metre wave shows things of roughly 0.10 to 0.25 m; half a wavelength sets two
// apart.
TEST_CASE("a wave of one metre shows things of 0.10 to 0.25 m, and sets two apart at half a metre by practice") {
    const Answers a = answers_for(one_layer(1e8, 3.0, 0.3, 1e8));
    CHECK(get(a, "layer.0.wavelength").likely.value == doctest::Approx(1.0));
    CHECK(get(a, "smallest").low == doctest::Approx(0.10));
    CHECK(get(a, "smallest").high == doctest::Approx(0.25));
    CHECK(get(a, "apart.sideways").rules[0].value == doctest::Approx(0.5));
    CHECK(get(a, "apart.down").rules[0].value == doctest::Approx(0.25));
}

// Annan & Cosway 1992, from memory; c = 0.299792458 m/ns: 0.249827 m at 100 MHz in K = 9, 0.0305974 at 1000 MHz in K
// = 6.
TEST_CASE("the published step, window and interval stand beside the computed ones") {
    Plan plan = one_layer(speed_of_light / 3.0, 5.0, 0.3, 100e6);
    const Answers a = answers_for(plan);
    CHECK(get(a, "pass.step").rules[0].value == doctest::Approx(0.249827).epsilon(3e-6));
    CHECK(get(a, "pass.window").rules[0].value == doctest::Approx(1.3 * 2.0 * 5.0 * 3.0 / speed_of_light));
    CHECK(get(a, "pass.interval").rules[0].value == doctest::Approx(1.66667e-9).epsilon(1e-5));
    const Answers b = answers_for(one_layer(speed_of_light / std::sqrt(6.0), 0.5, 0.1, 1000e6));
    CHECK(get(b, "pass.step").rules[0].value == doctest::Approx(0.0305974).epsilon(3e-6));
    // Ricker's upper -10 dB edge is 1.83429 fp (Wang 2015 for the form; value derived).
    CHECK(get(b, "pass.step").likely.value == doctest::Approx(0.0305974 / 1.83429).epsilon(1e-5));
    CHECK(get(b, "pass.interval").likely.value == doctest::Approx(0.5 / 1.83429e9).epsilon(1e-5));
}

TEST_CASE("a window that ends too soon says so and offers one that does not") {
    Plan plan = three_layers();
    plan.pass.window = 10e-9;
    Answers a = answers_for(plan);
    CHECK(get(a, "pass.window").grade == Grade::poor);
    CHECK(says(get(a, "pass.window"), "ends before the echo"));
    REQUIRE(!get(a, "pass.window").mends.empty());
    const Mend mend = get(a, "pass.window").mends[0];
    CHECK(set_number(plan, mend.field, mend.value).empty());
    a = answers_for(plan);
    CHECK(get(a, "pass.window").grade == Grade::good);
    CHECK(get(a, "pass.reach").grade == Grade::good);
    plan.pass.window = 1e-9;
    a = answers_for(plan);
    CHECK(says(get(a, "pass.window"), "shorter than the pulse"));
    CHECK(says(get(a, "pass.reach"), "no depth at all"));
}

TEST_CASE("every mend can be set and makes its own answer better or good") {
    Plan plan = three_layers();
    plan.pass = {0.3, 12e-9, 16, 1, 100.0};
    plan.lanes.spacing = 4.0;
    plan.need.closest = 0.2;
    plan.need.smallest = 0.02;
    int mended = 0;
    for (const Answer& before : answers_for(plan).list) {
        for (const Mend& mend : before.mends) {
            Plan better = plan;
            CHECK_MESSAGE(set_number(better, mend.field, mend.value).empty(), mend.field);
            const Answers after = answers_for(better);
            CHECK_MESSAGE(static_cast<int>(get(after, before.key.c_str()).grade) < static_cast<int>(before.grade),
                          before.key);
            ++mended;
        }
    }
    CHECK(mended >= 8);
}

TEST_CASE("too few samples are called folding, enough are good") {
    Plan plan = three_layers();
    plan.pass.samples = 32;
    CHECK(get(answers_for(plan), "pass.interval").grade == Grade::poor);
    CHECK(says(get(answers_for(plan), "pass.interval"), "folds over"));
    CHECK(get(answers_for(plan), "pass.error").grade == Grade::poor);
    plan.pass.samples = 512;
    CHECK(get(answers_for(plan), "pass.interval").grade == Grade::good);
    CHECK(get(answers_for(plan), "pass.error").grade == Grade::good);
}

TEST_CASE("a plan that makes no sense is answered with what makes none") {
    Plan plan = three_layers();
    plan.target.depth = exactly(0.0);
    Answers a = answers_for(plan);
    CHECK(get(a, "target.time").likely.issue == Issue::out_of_range);
    CHECK(says(get(a, "target.time"), "depth"));
    CHECK(get(a, "layer.0.speed").likely.ok());

    plan = three_layers();
    plan.lanes.spacing = 100.0;
    CHECK(says(get(answers_for(plan), "lanes.hits"), "wider than the site"));
    plan.lanes.outline.clear();
    CHECK(says(get(answers_for(plan), "lanes.hits"), "no ground"));

    plan = three_layers();
    plan.lanes.bearing = plan.target.bearing;
    CHECK(says(get(answers_for(plan), "lanes.between_hits"), "none crosses"));
    CHECK(get(answers_for(plan), "lanes.between_hits").likely.issue == Issue::no_solution);
}

TEST_CASE("a frequency outside a model's band is carried on with and said") {
    Plan plan = three_layers();
    const CatalogueRow* narrow = nullptr;
    for (const CatalogueRow& row : catalogue()) {
        if (row.material.band_low > 50e6 && row.material.model != Model::metal) narrow = &row;
    }
    REQUIRE(narrow != nullptr);
    plan.ground[0].matter = matter_of(narrow->id);
    plan.antenna.pulse.centre_frequency = 0.5 * narrow->material.band_low;
    const Answers a = answers_for(plan);
    CHECK(get(a, "layer.0.speed").likely.issue == Issue::outside_band);
    CHECK(says(get(a, "layer.0.speed"), std::string(sentence(Issue::outside_band)).c_str()));
    CHECK(get(a, "target.time").likely.issue == Issue::outside_band);
}

TEST_CASE("wavefronts lie one wavelength apart on the axis and bend at boundaries") {
    const Plan plan = three_layers();
    const Answers a = answers_for(plan);
    REQUIRE(a.beam.arcs.size() >= 3);
    const Stack stack = likely_stack(plan);
    const double f = plan.antenna.pulse.centre_frequency;
    for (std::size_t i = 0; i < a.beam.arcs.size(); ++i) {
        const auto& points = a.beam.arcs[i].points;
        CHECK(std::is_sorted(points.begin(), points.end(),
                             [](const Crossing& l, const Crossing& r) { return l.x < r.x; }));
        for (const Crossing& p : points) {
            // Independent route: the wave room's ray to that point takes the same time.
            CHECK(ray_to(stack, 0.0, p.x, p.depth, f).time ==
                  doctest::Approx(static_cast<double>(i + 1) / f).epsilon(1e-6));
        }
    }
    REQUIRE(a.beam.edge.size() == 2);
    CHECK(a.beam.edge[1].points.back().x == doctest::Approx(a.beam.patch_along));
}

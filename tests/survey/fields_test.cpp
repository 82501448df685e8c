#include "survey/fields.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <iomanip>
#include <limits>
#include <map>
#include <set>
#include <sstream>

#include "survey/words.hpp"

using namespace gg;

namespace {

/// A plan in which every part that may rest is in use.
Plan full_plan() {
    Plan plan;
    plan.ground = {Layer{matter_of("loam"), {0.4, 0.5, 0.6}}, Layer{matter_of("wet-clay"), exactly(1.0)}};
    plan.target.filling = Filling::own;
    plan.target.own = matter_of("own");
    plan.antenna.pulse.family = PulseFamily::gaussian_derivative;
    return at_rest(plan);
}

// Every leaf of a Plan, found by taking the structs apart: adding a member to one stops this from compiling, and the
// test below then asks for its line in the table.
std::string text_of(double x) {
    std::ostringstream text;
    text << std::setprecision(15) << x;
    return text.str();
}
std::string text_of(const Range& r) { return text_of(r.low) + " " + text_of(r.likely) + " " + text_of(r.high); }

std::map<std::string, std::string> leaves_of(const Plan& plan) {
    std::map<std::string, std::string> leaves;
    const auto matter = [&](const std::string& at, const Matter& m) {
        const auto& [material, inputs] = m;
        leaves[at + "material"] = material;
        for (int i = 0; i < input_count; ++i) {
            const auto input = static_cast<Input>(i);
            const CatalogueRow* row = find_material(material);
            if (takes(row ? row->material.model : Model::constant, input))
                leaves[at + std::string(key_of(input))] = text_of(inputs[input]);
        }
    };
    const auto& [name, note, ground, target, antenna, pass, lanes, need] = plan;
    for (std::size_t i = 0; i < ground.size(); ++i) {
        const auto& [layer_matter, thickness] = ground[i];
        matter("ground." + std::to_string(i) + ".", layer_matter);
        if (i + 1 < ground.size()) leaves["ground." + std::to_string(i) + ".thickness"] = text_of(thickness);
    }
    {
        const auto& [shape, filling, own, size, depth, count, gap, length, bearing] = target;
        leaves["shape"] = text_of(static_cast<double>(shape));
        leaves["filling"] = text_of(static_cast<double>(filling));
        matter("own.", own);
        leaves["size"] = text_of(size);
        leaves["depth"] = text_of(depth);
        leaves["count"] = text_of(count);
        leaves["gap"] = text_of(gap);
        leaves["length"] = text_of(length);
        leaves["target bearing"] = text_of(bearing);
    }
    {
        const auto& [pulse, separation, height, dynamic_range, channels, channel_spacing] = antenna;
        const auto& [family, centre_frequency, bandwidth] = pulse;
        leaves["family"] = text_of(static_cast<double>(family));
        leaves["centre frequency"] = text_of(centre_frequency);
        leaves["bandwidth"] = text_of(bandwidth);
        leaves["separation"] = text_of(separation);
        leaves["height"] = text_of(height);
        leaves["dynamic range"] = text_of(dynamic_range);
        leaves["channels"] = text_of(channels);
        leaves["channel spacing"] = text_of(channel_spacing);
    }
    {
        const auto& [step, window, samples, stacks, trace_rate] = pass;
        leaves["step"] = text_of(step);
        leaves["window"] = text_of(window * 1e9);
        leaves["samples"] = text_of(samples);
        leaves["stacks"] = text_of(stacks);
        leaves["trace rate"] = text_of(trace_rate);
    }
    {
        const auto& [outline, spacing, both_ways, bearing] = lanes;
        for (std::size_t i = 0; i < outline.size(); ++i) {
            const auto& [x, y] = outline[i];
            if (x != 0) leaves["corner x " + std::to_string(i)] = text_of(x);
            if (y != 0) leaves["corner y " + std::to_string(i)] = text_of(y);
        }
        leaves["spacing"] = text_of(spacing);
        leaves["both ways"] = text_of(both_ways);
        leaves["lanes bearing"] = text_of(bearing);
    }
    {
        const auto& [smallest, deepest, closest, depth_accuracy] = need;
        leaves["smallest"] = text_of(smallest);
        leaves["deepest"] = text_of(deepest);
        leaves["closest"] = text_of(closest);
        leaves["depth accuracy"] = text_of(depth_accuracy);
    }
    return leaves;
}

/// Leaves that differ between two plans; a leaf that only one has counts.
std::set<std::string> changed(const Plan& a, const Plan& b) {
    std::set<std::string> keys;
    const auto before = leaves_of(a), after = leaves_of(b);
    for (const auto& [key, value] : before)
        if (!after.count(key) || after.at(key) != value) keys.insert(key);
    for (const auto& [key, value] : after)
        if (!before.count(key)) keys.insert(key);
    return keys;
}

}  // namespace

TEST_CASE("every number and choice of a plan is in the table, and each line of the table changes something") {
    const Plan plan = full_plan();
    REQUIRE(faults_of(plan).empty());
    std::set<std::string> reached;
    for (const Field& field : fields_of(plan)) {
        Plan other = plan;
        const double now = number_at(plan, field.key).value();
        const double x = now == field.low ? std::min(field.high, field.low + field.step) : field.low;
        CHECK_MESSAGE(set_number(other, field.key, x) == "", field.key);
        const auto keys = changed(plan, other);
        CHECK_MESSAGE(!keys.empty(), field.key);
        CHECK_MESSAGE((keys.size() == 1 || field.derived), field.key);
        reached.insert(keys.begin(), keys.end());
    }
    for (const Choice& choice : choices_of(plan)) {
        CHECK(choice.options.size() >= 2);
        Plan other = plan;
        const std::string now = choice_at(plan, choice.key).value();
        for (const auto& option : choice.options)
            if (option.id != now) {
                CHECK(set_choice(other, choice.key, option.id) == "");
                break;
            }
        const auto keys = changed(plan, other);
        CHECK_MESSAGE(!keys.empty(), choice.key);
        reached.insert(keys.begin(), keys.end());
    }
    for (const auto& leaf : leaves_of(plan)) CHECK_MESSAGE(reached.count(leaf.first), leaf.first);
}

TEST_CASE("a number set is the number read, at both ends and in the middle of its limits") {
    for (const Field& field : fields_of(full_plan())) {
        CAPTURE(field.key);
        CHECK(field.low < field.high);
        CHECK(field.step > 0);
        CHECK(!field.label.empty());
        CHECK(field.label.size() <= 14);
        if (field.quantity == Quantity::angle) continue;  // its ends are one and the same direction
        for (const double share : {0.0, 0.5, 1.0}) {
            Plan plan = full_plan();
            double x = field.low + share * (field.high - field.low);
            if (field.quantity == Quantity::count) x = std::round(x);
            CHECK(set_number(plan, field.key, x) == "");
            CHECK(number_at(plan, field.key).value() == doctest::Approx(x).epsilon(1e-11));
        }
    }
}

TEST_CASE("a number outside its limits is refused with a sentence that says them, and the plan stays as it was") {
    const double inf = std::numeric_limits<double>::infinity();
    for (const Field& field : fields_of(full_plan())) {
        if (field.quantity == Quantity::angle) continue;
        Plan plan = full_plan();
        const double span = field.high - field.low;
        for (const double x : {field.low - span, field.high + span, inf, -inf, std::nan("")}) {
            const std::string wrong = set_number(plan, field.key, x);
            CHECK_MESSAGE(wrong.find(token(field.high, field.quantity)) != std::string::npos, field.key);
            CHECK(wrong.find(field.label) == 0);
        }
        CHECK(plan == full_plan());
    }
    Plan plan = full_plan();
    CHECK(set_number(plan, "target.bearing", inf) != "");
    CHECK(set_number(plan, "target.nothing", 1.0) == "There is no field \"target.nothing\" in this plan.");
    CHECK(set_number(plan, "target.size.low", 0.1) != "");  // no range
    CHECK(!number_at(plan, "target.size.low"));
    CHECK(!find_field(plan, "target.size.high"));
    CHECK(plan == full_plan());
}

TEST_CASE("a likely value takes an end of its range along, and an end does not pass the likely value") {
    Plan plan = full_plan();
    CHECK(set_number(plan, "ground.0.thickness", 0.8) == "");
    CHECK(plan.ground[0].thickness == Range{0.4, 0.8, 0.8});
    CHECK(set_number(plan, "ground.0.thickness", 0.2) == "");
    CHECK(plan.ground[0].thickness == Range{0.2, 0.2, 0.8});
    CHECK(set_number(plan, "ground.0.thickness.low", 0.3) != "");
    CHECK(set_number(plan, "ground.0.thickness.high", 0.1) != "");
    CHECK(plan.ground[0].thickness == Range{0.2, 0.2, 0.8});
    CHECK(set_number(plan, "ground.0.thickness.low", 0.1) == "");
    CHECK(set_number(plan, "ground.0.thickness.high", 0.3) == "");
    CHECK(plan.ground[0].thickness == Range{0.1, 0.2, 0.3});
    CHECK(number_at(plan, "ground.0.thickness.low") == 0.1);
    CHECK(find_field(plan, "ground.0.thickness.high")->key == "ground.0.thickness");
}

TEST_CASE("numbers are kept without the crumbs of binary arithmetic") {
    Plan plan = full_plan();
    CHECK(set_number(plan, "pass.step", 0.1 + 0.2) == "");
    CHECK(plan.pass.step == 0.3);
    CHECK(set_number(plan, "pass.window", 60 * 1e-9) == "");
    CHECK(plan.pass.window == 60e-9);
    CHECK(set_number(plan, "antenna.frequency", 1600.0 * 1e6) == "");
    CHECK(plan.antenna.pulse.centre_frequency == 1600e6);
    CHECK(set_number(plan, "pass.samples", 511.6) == "");
    CHECK(plan.pass.samples == 512);
}

TEST_CASE("bearings wrap: a whole turn for the walk, half a turn for a target that has no direction") {
    Plan plan = full_plan();
    CHECK(set_number(plan, "lanes.bearing", -pi / 2) == "");
    CHECK(plan.lanes.bearing == doctest::Approx(1.5 * pi));
    CHECK(set_number(plan, "target.bearing", 1.25 * pi) == "");
    CHECK(plan.target.bearing == doctest::Approx(0.25 * pi));
    CHECK(set_number(plan, "target.bearing", pi) == "");
    CHECK(plan.target.bearing == 0.0);
    CHECK(set_number(plan, "target.bearing", 15 * (pi / 180) * (1 + 1e-15)) == "");
    CHECK(plan.target.bearing == 15.0 * (pi / 180));
}

TEST_CASE("stretching the site scales its outline and leaves its shape") {
    Plan plan = full_plan();
    plan.lanes.outline = {{2, 1}, {6, 1}, {6, 2}, {4, 2}, {4, 3}, {2, 3}};
    CHECK(number_at(plan, "lanes.width") == 4.0);
    CHECK(number_at(plan, "lanes.height") == 2.0);
    CHECK(set_number(plan, "lanes.width", 8.0) == "");
    CHECK(plan.lanes.outline == std::vector<SitePoint>{{2, 1}, {10, 1}, {10, 2}, {6, 2}, {6, 3}, {2, 3}});
    plan.lanes.outline = {{1, 1}, {1, 2}, {1, 3}};
    CHECK(set_number(plan, "lanes.width", 8.0) != "");
}

TEST_CASE("choosing a material brings its catalogue ranges, and the form then asks for what its model takes") {
    Plan plan = full_plan();
    CHECK(set_choice(plan, "ground.1.material", "granite") == "");
    CHECK(plan.ground[1].matter == matter_of("granite"));
    CHECK(find_field(plan, "ground.1.permittivity"));
    CHECK(!find_field(plan, "ground.1.clay"));
    CHECK(find_field(plan, "ground.0.clay"));
    CHECK(set_choice(plan, "ground.1.material", "own") == "");
    CHECK(faults_of(plan).empty());
    CHECK(set_choice(plan, "ground.1.material", "cheese").find("granite") != std::string::npos);
    CHECK(set_choice(plan, "ground.1.material", "metal") != "");
    CHECK(set_choice(plan, "ground.9.material", "granite") != "");
    for (const CatalogueRow& row : catalogue()) {
        if (row.material.model == Model::metal) continue;
        CHECK(set_choice(plan, "ground.1.material", row.id) == "");
        CHECK_MESSAGE(faults_of(plan).empty(), row.id);
    }
}

TEST_CASE("the own filling of a target is asked for where it is used, and at rest elsewhere") {
    Plan plan = full_plan();
    CHECK(find_field(plan, "target.own.permittivity"));
    CHECK(set_choice(plan, "target.filling", "metal") == "");
    CHECK(plan.target.own == Matter{});
    CHECK(!choice_at(plan, "target.own.material"));
    CHECK(set_choice(plan, "target.filling", "own") == "");
    CHECK(plan.target.own == matter_of("own"));
    CHECK(faults_of(plan).empty());
}

TEST_CASE("layers come and go, from one to eight") {
    Plan plan = full_plan();
    CHECK(add_layer(plan, 1) == "");
    CHECK(plan.ground.size() == 3);
    CHECK(plan.ground[1].matter == plan.ground[2].matter);
    CHECK(add_layer(plan, 3) != "");
    CHECK(add_layer(plan, -1) != "");
    while (plan.ground.size() < most_layers) CHECK(add_layer(plan, 0) == "");
    CHECK(add_layer(plan, 0) == "A plan holds at most 8 layers.");
    CHECK(faults_of(plan).empty());
    CHECK(plan == at_rest(plan));
    while (plan.ground.size() > 1) CHECK(remove_layer(plan, static_cast<int>(plan.ground.size()) - 1) == "");
    CHECK(plan == at_rest(plan));
    CHECK(remove_layer(plan, 0) == "The ground needs at least one layer.");
    CHECK(remove_layer(plan, 1) != "");
}

TEST_CASE("a plan that makes no sense is told so, one sentence for each thing") {
    const auto only_fault = [](auto&& spoil, const std::string& words) {
        Plan plan = full_plan();
        spoil(plan);
        const auto faults = faults_of(plan);
        REQUIRE_MESSAGE(faults.size() == 1, words);
        CHECK_MESSAGE(faults[0].find(words) != std::string::npos, faults[0]);
    };
    only_fault([](Plan& p) { p.ground.clear(); }, "at least one layer");
    only_fault([](Plan& p) { p.ground.resize(9, p.ground[0]); }, "at most 8");
    only_fault([](Plan& p) { p.ground[1].matter.material = "cheese"; }, "cheese");
    only_fault([](Plan& p) { p.ground[0].matter.material = "metal"; }, "metal");
    only_fault([](Plan& p) { p.ground[0].thickness.low = std::nan(""); }, "ground.0.thickness");
    only_fault([](Plan& p) { p.ground[0].thickness = {0.5, 0.4, 0.6}; }, "between its low and its high end");
    only_fault([](Plan& p) { p.ground[0].matter.inputs[Input::clay] = exactly(0.9); }, "Sand and clay");
    only_fault([](Plan& p) { p.target.gap = 0.05; }, "overlap");
    only_fault([](Plan& p) { p.antenna.channels = 4; }, "antenna.channel_spacing");
    only_fault([](Plan& p) { p.antenna.pulse.centre_frequency = -1; }, "antenna.frequency");
    only_fault([](Plan& p) { p.pass.samples = 0; }, "pass.samples");
    only_fault([](Plan& p) { p.lanes.outline = {{0, 0}, {1, 1}}; }, "three corners");
    only_fault([](Plan& p) { p.lanes.outline = {{0, 0}, {1, 1}, {2, 2}}; }, "encloses no ground");
    only_fault([](Plan& p) { p.lanes.outline = {{0, 0}, {2, 2}, {3, 0}, {0, 3}}; }, "crosses itself");
    only_fault([](Plan& p) { p.lanes.outline[2].x = std::nan(""); }, "Corner 3");
    Plan flat = full_plan();
    flat.target.shape = TargetShape::flat;
    flat.target.gap = 0.05;
    CHECK(faults_of(flat).empty());
}

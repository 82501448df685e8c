#include "paper/plan_file.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <nlohmann/json.hpp>
#include <random>

#include "survey/answers.hpp"

using namespace gg;
using nlohmann::json;

namespace {

constexpr const char* smallest = R"({"schema": 1, "ground": [{"material": "wet-clay"}]})";

bool has(const std::vector<std::string>& sentences, std::string_view words) {
    for (const std::string& s : sentences)
        if (s.find(words) != std::string::npos) return true;
    return false;
}

/// A demo plan with one part of it changed.
json changed(const char* pointer, json value) {
    json plan = json::parse(demos().front().json);
    plan[json::json_pointer(pointer)] = std::move(value);
    return plan;
}

std::vector<std::string> faults(const json& plan) { return read_plan(plan.dump()).faults; }

/// Any plan the setters can make.
Plan random_plan(std::mt19937& random) {
    const auto pick = [&](double low, double high) { return std::uniform_real_distribution(low, high)(random); };
    Plan plan = read_plan(smallest).plan;
    for (int layers = static_cast<int>(pick(0, 7)); layers > 0; --layers) CHECK(add_layer(plan, 0) == "");
    for (int round = 0; round < 2; ++round)
        for (const Choice& choice : choices_of(plan)) {
            const auto index = static_cast<std::size_t>(pick(0, 0.999) * static_cast<double>(choice.options.size()));
            if (choice_at(plan, choice.key))  // an earlier choice may have taken it away
                CHECK(set_choice(plan, choice.key, choice.options[index].id) == "");
        }
    for (const Field& field : fields_of(plan)) {
        CHECK(set_number(plan, field.key, pick(field.low, field.high)) == "");
        if (!field.is_range) continue;
        const double likely = number_at(plan, field.key).value();
        CHECK(set_number(plan, field.key + ".low", pick(field.low, likely)) == "");
        CHECK(set_number(plan, field.key + ".high", pick(likely, field.high)) == "");
    }
    plan.name = "Plan \"" + std::to_string(pick(0, 1)) + "\" \xc3\xa4\n";
    return plan;
}

}  // namespace

TEST_CASE("a plan written and read is the same plan, to the last bit") {
    std::mt19937 random(20);
    for (int i = 0; i < 300; ++i) {
        const Plan plan = random_plan(random);
        const ReadPlan read = read_plan(write_plan(plan));
        REQUIRE_MESSAGE(read.ok(), read.faults.front());
        CHECK(read.notes.empty());
        CHECK(read.plan == plan);
        CHECK(write_plan(read.plan) == write_plan(plan));
    }
}

TEST_CASE("every demo plan opens without a note, makes sense and has a name of its own") {
    REQUIRE(demos().size() >= 3);
    CHECK(demos().front().id == "yard-pipe");
    for (const Demo& demo : demos()) {
        const ReadPlan read = read_plan(demo.json);
        CHECK_MESSAGE(read.faults.empty(), demo.id);
        CHECK_MESSAGE(read.notes.empty(), demo.id << ": " << (read.notes.empty() ? "" : read.notes.front()));
        CHECK_MESSAGE(faults_of(read.plan).empty(), demo.id);
        CHECK(read.plan.name == demo.name);
        CHECK(read_plan(write_plan(read.plan)).plan == read.plan);
        for (const Demo& other : demos()) CHECK((&other == &demo || (other.name != demo.name && other.id != demo.id)));
    }
}

TEST_CASE("the written file is the documented one: SI units, degrees where the key says so, ranges as three numbers") {
    Plan plan = read_plan(demos().front().json).plan;
    CHECK(set_number(plan, "lanes.bearing", pi / 2) == "");
    CHECK(set_number(plan, "target.bearing", 0.123456789012345) == "");
    const json file = json::parse(write_plan(plan));
    CHECK(file["schema"] == 1);
    CHECK(file["lanes"]["bearing_deg"] == 90.0);
    CHECK(file["target"]["bearing_deg"].get<double>() == doctest::Approx(0.123456789012345 * 180 / pi).epsilon(1e-9));
    CHECK(file["pass"]["window"] == 60e-9);
    CHECK(file["pass"]["samples"].is_number_integer());
    CHECK(file["target"]["depth"] == json({0.75, 0.9, 1.05}));
    CHECK(file["target"]["size"] == 0.11);
    CHECK(file["ground"][2]["material"] == "wet-clay");
    CHECK_FALSE(file["ground"][2].contains("thickness"));
    CHECK(file["lanes"]["outline"][2] == json({20.0, 15.0}));
    CHECK_FALSE(file["lanes"].contains("width"));
}

TEST_CASE("what is left out has its usual value, and a note says which") {
    const ReadPlan read = read_plan(smallest);
    CHECK(read.ok());
    CHECK(read.plan.ground[0].matter == matter_of("wet-clay"));
    CHECK(read.plan.target == Target{});
    CHECK(has(read.notes, "target is missing"));
    CHECK(has(read.notes, "name is missing"));

    json part = json::parse(demos().front().json);
    part["target"].erase("gap");
    part["lanes"].erase("outline");
    part.erase("schema");
    const ReadPlan partly = read_plan(part.dump());
    CHECK(partly.ok());
    CHECK(partly.plan.target.gap == Target{}.gap);
    CHECK(has(partly.notes, "target.gap is missing: 0.4 is taken."));
    CHECK(has(partly.notes, "lanes.outline is missing"));
    CHECK(has(partly.notes, "schema is missing"));
    CHECK(partly.notes.size() == 3);
}

TEST_CASE("a key that no plan has is noted and passed over") {
    const ReadPlan read = read_plan(changed("/target/colour", "red").dump());
    CHECK(read.ok());
    CHECK(read.notes ==
          std::vector<std::string>{"\"target.colour\" is no key that this plan uses: it is passed over."});
    CHECK(has(read_plan(changed("/ground/1/thicknes", 3).dump()).notes, "ground.1.thicknes"));
    CHECK(has(read_plan(changed("/extra", {{"deep", {{"deeper", 1}}}}).dump()).notes, "extra"));
}

TEST_CASE("a wrong value is a fault that names its key, what it is and what it must be") {
    CHECK(has(faults(changed("/target/size", "big")), "target.size is \"big\"; it must be a number (m)."));
    CHECK(has(faults(changed("/target/size", -1)), "target.size is -1; it must be from 0.001 to 10.0 (m)."));
    CHECK(
        has(faults(changed("/target/count", 1.5)), "target.count is 1.5; it must be a whole number from 1.0 to 12.0."));
    CHECK(has(faults(changed("/target/depth", true)), "or [low, likely, high]"));
    CHECK(has(faults(changed("/target/depth", {1, 2})), "target.depth is a list of 2"));
    CHECK(has(faults(changed("/target/depth", {1, 3, 2})), "out of order"));
    CHECK(has(faults(changed("/target/depth", {1, 2, "x"})), "target.depth is \"x\""));
    CHECK(has(faults(changed("/target/shape", "square")),
              "target.shape: Shape has no option \"square\"; there are round"));
    CHECK(has(faults(changed("/target/shape", 3)), "target.shape is 3; it must be a name in quotes."));
    CHECK(has(faults(changed("/target", 3)), "target is 3"));
    CHECK(has(faults(changed("/target/bearing_deg", "north")), "(degrees)"));
    CHECK(has(faults(changed("/antenna/frequency", 1e12)), "antenna.frequency"));
    CHECK(has(faults(changed("/ground/0/material", "cheese")), "ground.0.material: Material has no option \"cheese\""));
    CHECK(has(faults(changed("/ground/0", 7)), "ground.0 is 7"));
    CHECK(has(faults(changed("/ground", json::array())), "ground is a list of 0"));
    CHECK(has(faults(changed("/ground", "clay")), "ground is \"clay\""));
    CHECK(has(faults(changed("/lanes/outline", {{0, 0}, {1, 1}})), "3 to 200 corners"));
    CHECK(has(faults(changed("/lanes/outline", {{0, 0}, {1, 1}, {"a", 2}})), "a corner that is a list"));
    CHECK(has(faults(changed("/name", 5)), "name is 5; it must be text in quotes."));
    CHECK(faults(changed("/name", "5")).empty());
    CHECK(has(read_plan(R"({"schema": 1})").faults, "ground is missing"));
}

TEST_CASE("a newer schema is refused politely, and no schema that never was is taken") {
    const auto newer = faults(changed("/schema", plan_schema + 1));
    CHECK(has(newer, "newer Groundgrain"));
    CHECK(has(newer, "left as it is"));
    CHECK(newer.size() == 1);
    CHECK(has(faults(changed("/schema", 0)), "whole number from 1"));
    CHECK(has(faults(changed("/schema", "one")), "whole number from 1"));
    CHECK(has(faults(changed("/schema", 1e30)), "whole number from 1"));
}

TEST_CASE("bytes that are no plan give a sentence, whatever they are") {
    CHECK(has(read_plan("").faults, "not JSON"));
    CHECK(has(read_plan("hello").faults, "not JSON"));
    CHECK(has(read_plan("[1, 2]").faults, "not a plan"));
    CHECK(has(read_plan("3").faults, "not a plan"));
    CHECK(has(read_plan(R"({"schema": 1, "ground": [{"thickness": 1e999}]})").faults, "not JSON"));
    CHECK(has(read_plan(std::string_view("{\"a\": \"\xff\"}")).faults, "not JSON"));
    CHECK(has(read_plan(std::string(2'000'000, ' ')).faults, "larger than 1 MB"));
    CHECK(!read_plan(std::string(900'000, '[')).ok());
    CHECK(has(read_plan(std::string(400'000, '[') + std::string(400'000, ']')).faults, "nests deeper"));
}

TEST_CASE("no damage to a file makes a reader fall over or gives a plan out of its limits") {
    std::mt19937 random(7);
    for (const Demo& demo : demos())
        for (int i = 0; i < 1500; ++i) {
            std::string bytes = demo.json;
            for (int hits = 1 + static_cast<int>(random() % 4); hits > 0; --hits) {
                const std::size_t at = random() % bytes.size();
                constexpr std::string_view marks = "0123456789.-eE[]{},:\"n ";
                switch (random() % 3) {
                    case 0:
                        bytes[at] = marks[random() % marks.size()];
                        break;
                    case 1:
                        bytes.erase(at, 1 + random() % 8);
                        break;
                    default:
                        bytes.insert(at, bytes.substr(random() % bytes.size(), random() % 12));
                }
            }
            const ReadPlan read = read_plan(bytes);
            if (read.ok()) CHECK(number_faults(read.plan).empty());
        }
}

TEST_CASE("answers are written whole: every answer with its value in SI, a reason in words, and the caution") {
    for (const Demo& demo : demos()) {
        const Plan plan = read_plan(demo.json).plan;
        const Answers answers = answers_for(plan);
        const json file = json::parse(write_answers(plan, answers));
        CHECK(file["plan"] == demo.name);
        CHECK(file["caution"] == std::string(caution()));
        REQUIRE(file["answers"].size() == answers.list.size());
        for (std::size_t i = 0; i < answers.list.size(); ++i) {
            const json& written = file["answers"][i];
            const Answer& answer = answers.list[i];
            CHECK(written["key"] == answer.key);
            if (answer.likely.ok())
                CHECK(written["value"] == answer.likely.value);
            else
                CHECK(written["value"].is_null());
            // Numbers inside sentences are spelt out, not left as tokens.
            CHECK(written["why"].get<std::string>().find('{') == std::string::npos);
            CHECK(written["rules"].size() == answer.rules.size());
            if (answer.likely.ok())
                CHECK(written["says"].get<std::string>().rfind(
                          say(answer.likely.value, answer.quantity, UnitSystem::metric), 0) == 0);
            else
                CHECK(written["says"] == std::string(sentence(answer.likely.issue)));
        }
    }
    CHECK(caution().find("cannot prove that nothing is there") != std::string_view::npos);
}

#include "app/command_line.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <cstdio>
#include <fstream>
#include <nlohmann/json.hpp>
#include <sstream>

#include "draw/figure.hpp"
#include "paper/plan_file.hpp"
#include "survey/answers.hpp"
#include "survey/section.hpp"

using namespace gg;

namespace {

struct Run {
    int status = 0;
    std::string out, err;
    std::vector<platform::Options> windows;
};

Run run(const std::vector<std::string>& words, const std::string& input = {}) {
    std::istringstream in(input);
    std::ostringstream out, err;
    Run result;
    const auto open_window = [&](const platform::Options& options) {
        result.windows.push_back(options);
        return 0;
    };
    result.status = run_command_line(words, in, out, err, open_window);
    result.out = out.str();
    result.err = err.str();
    return result;
}

const std::string& demo_plan() { return demos().front().json; }

bool has(const std::string& text, std::string_view words) { return text.find(words) != std::string::npos; }

/// A complaint is one line on the error stream, and status 2.
void check_refused(const Run& run, std::string_view words) {
    CHECK(run.status == 2);
    CHECK(run.out.empty());
    CHECK_MESSAGE(has(run.err, words), run.err);
    CHECK(run.err.rfind("groundgrain: ", 0) == 0);
    CHECK(run.err.find('\n') == run.err.size() - 1);
}

}  // namespace

TEST_CASE("answers writes the same JSON as the library, from standard input") {
    const Run result = run({"answers", "-"}, demo_plan());
    CHECK(result.status == 0);
    CHECK(result.err.empty());
    const Plan plan = read_plan(demo_plan()).plan;
    CHECK(result.out == write_answers(plan, settled_answers_for(plan)));
    CHECK(has(result.out, std::string(caution())));
}

TEST_CASE("picture writes an SVG of each view, at the size and in the theme and units asked for") {
    for (const ViewRow& view : views()) {
        const Run result = run({"picture", "-", view.id, "--size", "400x300"}, demo_plan());
        CHECK(result.status == 0);
        CHECK(has(result.out, "<svg"));
        CHECK(has(result.out, "</svg>"));
        CHECK(has(result.out, "400"));
        CHECK(has(result.out, "Yard pipe"));
        CHECK(has(result.out, "cannot prove"));
        const Run dark = run({"picture", "-", view.id, "--size", "400x300", "--dark"}, demo_plan());
        CHECK(dark.out != result.out);
        const Run imperial = run({"picture", "--imperial", "-", view.id, "--size", "400x300"}, demo_plan());
        CHECK(imperial.out != result.out);
    }
}

TEST_CASE("check tells what is thin or poor, and its status says whether anything is") {
    const Run result = run({"check", "-"}, demo_plan());
    const Answers answers = settled_answers_for(read_plan(demo_plan()).plan);
    bool poor = false;
    for (const Answer& answer : answers.list) {
        poor = poor || answer.grade == Grade::poor;
        if (answer.grade == Grade::poor || answer.grade == Grade::thin)
            CHECK_MESSAGE(has(result.out, answer.name), answer.name);
    }
    CHECK(result.status == (poor ? 1 : 0));
    CHECK(has(result.out, "cannot prove"));
    CHECK_FALSE(has(result.out, "{"));  // numbers are said, not left as tokens

    nlohmann::json plan = nlohmann::json::parse(demo_plan());
    plan["pass"]["step"] = 2.0;
    const Run coarse = run({"check", "-"}, plan.dump());
    CHECK(coarse.status == 1);
    CHECK(has(coarse.out, "poor"));

    plan["target"]["gap"] = 0.05;
    const Run overlapping = run({"check", "-"}, plan.dump());
    CHECK(overlapping.status == 1);
    CHECK(has(overlapping.out, "fault"));
    CHECK(has(overlapping.out, "overlap"));
}

TEST_CASE("section writes the traces as a table: time in ns, then one column per antenna position in m") {
    nlohmann::json json = nlohmann::json::parse(demo_plan());
    json["pass"]["step"] = 0.1;
    json["pass"]["samples"] = 64;
    const Run result = run({"section", "-"}, json.dump());
    CHECK(result.status == 0);
    CHECK(result.err.empty());
    CHECK(has(result.out, "Holds: targets, layers. Electric field along the targets"));
    CHECK(has(result.out, "cannot prove"));

    // Read back with a reader of our own, against the library.
    const Plan plan = read_plan(json.dump()).plan;
    const Section section = section_for(plan, Detail::exact);
    const std::vector<double> record = record_of(section, {});
    double strongest = 0.0;
    for (const double value : record) strongest = std::max(strongest, std::abs(value));
    std::istringstream lines(result.out);
    std::string line;
    int row = -1;
    while (std::getline(lines, line)) {
        if (line.rfind('#', 0) == 0) continue;
        std::istringstream cells(line);
        std::string cell;
        REQUIRE(std::getline(cells, cell, ','));
        if (row < 0)
            CHECK(cell == "time_ns");
        else
            CHECK(std::stod(cell) == doctest::Approx(60.0 / 64 * row));
        int column = 0;
        for (; std::getline(cells, cell, ','); ++column) {
            const double want = row < 0 ? section.first + column * section.step
                                        : record[static_cast<std::size_t>(column * section.samples + row)];
            CHECK(std::abs(std::stod(cell) - want) <= 1e-5 * (row < 0 ? 1.0 : strongest));
        }
        CHECK(column == section.traces);
        ++row;
    }
    CHECK(row == 64);
}

TEST_CASE("section's switches change what is in the table") {
    nlohmann::json json = nlohmann::json::parse(demo_plan());
    json["pass"]["step"] = 0.2;
    json["pass"]["samples"] = 64;
    const auto table = [&](std::vector<std::string> words) {
        words.insert(words.begin(), {"section", "-"});
        const Run result = run(words, json.dump());
        CHECK(result.status == 0);
        return result.out.substr(result.out.find("\n", result.out.find("cannot prove")));
    };
    const std::string plain = table({});
    CHECK(table({"--include", "targets,layers"}) == plain);
    CHECK(table({"--include", "layers,targets", "--field", "along", "--gain", "off"}) == plain);
    for (const std::vector<std::string>& words : {std::vector<std::string>{"--include", "targets"},
                                                  {"--include", "targets,layers,noise"},
                                                  {"--include", "direct"},
                                                  {"--field", "across"},
                                                  {"--gain", "even"}})
        CHECK_MESSAGE(table(words) != plain, words.back());
    CHECK(table({"--focused"}).rfind("\ndepth_m,", 0) == 0);
    check_refused(run({"section", "-", "--include", "targets,birds"}, json.dump()), "--include cannot be");
    check_refused(run({"section", "-", "--include", ""}, json.dump()), "--include cannot be");
    check_refused(run({"section", "-", "--field", "up"}, json.dump()), "along or across");
    check_refused(run({"section", "-", "--gain", "lots"}, json.dump()), "off, or even");
    check_refused(run({"answers", "-", "--focused"}, json.dump()), "does not go with this command");
    json["target"]["shape"] = "flat";
    check_refused(run({"section", "-"}, json.dump()), "round targets");
}

TEST_CASE("a plan that cannot be read is one sentence and status 2") {
    check_refused(run({"check", "no-such-folder/plan.json"}), "Cannot read no-such-folder/plan.json: No such file");
    check_refused(run({"answers", "-"}, "hello"), "This file is not JSON.");
    check_refused(run({"answers", "-"}, ""), "This file is not JSON.");
    check_refused(run({"picture", "-", "beam"}, R"({"schema": 99})"), "newer Groundgrain");
    check_refused(run({"answers", "-"}, std::string(3'000'000, ' ')), "larger than 1 MB");
    CHECK(run({"answers", "."}).status == 2);
}

TEST_CASE("wrong words are one sentence that says what would be right") {
    check_refused(run({"picture", "plan.json"}), "picture needs a view as well, one of beam, pulse");
    check_refused(run({"picture", "plan.json", "sideways"}), "There is no view \"sideways\"; there are beam, pulse");
    check_refused(run({"answers"}), "answers needs a plan file");
    check_refused(run({"answers", "a", "b"}), "does not know what to do with \"b\"");
    check_refused(run({"answers", "-", "--dark"}), "--dark does not go with this command");
    check_refused(run({"--frobnicate"}), "There is no option \"--frobnicate\"");
    check_refused(run({"picture", "-", "beam", "--size"}), "--size needs a WxH after it");
    check_refused(run({"picture", "-", "beam", "--size", "big"}), "--size cannot be \"big\"");
    check_refused(run({"picture", "-", "beam", "--size", "1x1"}), "80x80 to 10000x10000");
    check_refused(run({"demo", "moon"}), "There is no demo plan \"moon\"");
    check_refused(run({"answers", "-", "-o", "no-such-folder/out.json"}, demo_plan()),
                  "Cannot write no-such-folder/out.json");
}

TEST_CASE("no command opens the window, with the plan and options given") {
    CHECK(run({}).windows.size() == 1);
    const Run result = run({"plan.json", "--dark", "--size", "800x600", "--scale", "2", "--shot", "out.ppm"});
    REQUIRE(result.windows.size() == 1);
    CHECK(result.windows[0].plan_file == "plan.json");
    CHECK(result.windows[0].dark);
    CHECK(result.windows[0].width == 800);
    CHECK(result.windows[0].height == 600);
    CHECK(result.windows[0].scale == 2.0);
    CHECK(result.windows[0].shot_file == "out.ppm");
    CHECK(run({"--", "answers"}).windows.at(0).plan_file == "answers");
    CHECK(run({"--help"}).windows.empty());
}

TEST_CASE("help names every command and view, and the caution; the demo plans are listed and written") {
    const Run help = run({"--help"});
    CHECK(help.status == 0);
    for (const char* words : {"answers PLAN", "picture PLAN VIEW", "section PLAN", "check PLAN", "demo [NAME]",
                              "--size WxH", "beam", "lanes", "cannot prove", "Examples"})
        CHECK_MESSAGE(has(help.out, words), words);
    CHECK(run({"check", "-h"}).out == help.out);
    CHECK(has(run({"--version"}).out, "Groundgrain 0."));

    const Run list = run({"demo"});
    for (const Demo& demo : demos()) {
        CHECK(has(list.out, demo.id));
        CHECK(run({"demo", demo.id}).out == demo.json);
    }
}

TEST_CASE("-o writes to a file what would have gone to standard output") {
    const char* place = "groundgrain_command_line_test.json";
    const Run result = run({"answers", "-", "-o", place}, demo_plan());
    CHECK(result.status == 0);
    CHECK(result.out.empty());
    std::ifstream file(place);
    std::stringstream written;
    written << file.rdbuf();
    CHECK(written.str() == run({"answers", "-"}, demo_plan()).out);
    std::remove(place);
}

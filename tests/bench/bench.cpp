/// Time per answers_for() on the demos, and of its parts; processor time, so that a busy machine disturbs it little.
#include <cstdio>
#include <ctime>

#include "paper/plan_file.hpp"
#include "survey/parts.hpp"
#include "survey/patch.hpp"
#include "survey/rebuild.hpp"
#include "survey/sideways.hpp"

namespace {

using namespace gg;

template <class F>
void time_it(const char* what, F f) {
    f();
    const std::clock_t begin = std::clock();
    int runs = 0;
    double seconds = 0.0;
    while (seconds < 0.2) {
        for (int i = 0; i < 5; ++i) f();
        runs += 5;
        seconds = static_cast<double>(std::clock() - begin) / CLOCKS_PER_SEC;
    }
    std::printf("  %-24s %10.2f us\n", what, 1e6 * seconds / runs);
}

void parts_of(const Plan& given) {
    const Sane sane = make_sane(given);
    const Cases cases = cases_of(sane.plan);
    const Setting setting{sane.plan, cases, band_of(sane.plan.antenna.pulse, 10.0)};
    const Case& c = cases.likely();
    std::printf("  (%zu grounds and depths)\n", cases.all.size());
    time_it("cases", [&] { cases_of(sane.plan); });
    time_it("one echo", [&] { EchoPulse(c.ground->spectrum, c.ground->stack, c.depth, c.height); });
    time_it("one lit patch", [&] { lit_patch(c.path, c.separation, setting.frequency()); });
    time_it("one smallest gap", [&] { smallest_gap(c, setting.radius()); });
    const auto part = [&](const char* name, auto f) {
        time_it(name, [&] {
            Answers answers;
            answers.list.reserve(80);
            f(answers);
        });
    };
    const Patch patch = lit_patch(c.path, c.separation, setting.frequency());
    part("wave", [&](Answers& a) { add_wave(setting, a); });
    part("lit patch", [&](Answers& a) { add_patch(setting, a); });
    part("pulse", [&](Answers& a) { add_pulse(setting, a); });
    part("downwards", [&](Answers& a) { add_downwards(setting, a); });
    part("sideways", [&](Answers& a) { add_sideways(setting, a); });
    part("pass", [&](Answers& a) { add_pass(setting, patch, a); });
    part("lanes", [&](Answers& a) { add_lanes(setting, patch, a); });
    part("beam picture", [&](Answers& a) { draw_beam(setting, patch, a); });
    part("pulse picture", [&](Answers& a) { draw_pulse(setting, a); });
}

}  // namespace

int main() {
    for (const Demo& demo : demos()) {
        const ReadPlan read = read_plan(demo.json);
        std::printf("%s\n", demo.name.c_str());
        if (!read.ok()) {
            std::printf("  cannot be read: %s\n", read.faults.front().c_str());
            return 1;
        }
        time_it("answers_for", [&] { answers_for(read.plan); });
        parts_of(read.plan);
    }
    return demos().empty() ? 1 : 0;
}

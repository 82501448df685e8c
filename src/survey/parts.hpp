#pragma once
/// The parts that answers_for() is put together from; one source each.
#include "survey/answers.hpp"
#include "survey/cases.hpp"
#include "survey/sane.hpp"

namespace gg {

/// What every part reads.
struct Setting {
    const Plan& plan;  ///< sane
    const Cases& cases;
    Band band;  ///< of the sent pulse, -10 dB

    const Case& likely() const { return cases.likely(); }
    double frequency() const { return plan.antenna.pulse.centre_frequency; }
    /// Radius that the wave sees at the target's top, m: 0 for a flat one.
    double radius() const { return plan.target.shape == TargetShape::flat ? 0.0 : 0.5 * plan.target.size; }
};

/// `f` gives a number for a case, or a Value: the likely one keeps its issue, and the ends count stand-ins, too; a case
/// of Issue::not_a_number does not count.
template <class F>
Spread spread_over(const Cases& cases, F f) {
    Spread s;
    s.likely = finite(f(cases.likely()));
    s.low = s.high = s.likely.value;
    for (std::size_t i = 1; i < cases.all.size(); ++i) {
        const Value v = finite(f(cases.all[i]));
        if (v.issue == Issue::not_a_number) continue;
        if (v.value < s.low) s.low = v.value;
        if (v.value > s.high) s.high = v.value;
    }
    return s;
}
/// A spread of no width.
inline Spread just(double x) {
    const Value v = finite(x);
    return {v, v.value, v.value};
}

/// Adds an answer and gives it back for its why, grade, rules and mends.
Answer& add(Answers& answers, Group group, std::string key, std::string name, Quantity quantity, const Spread& spread);

/// Carries the issue of the ground's models over to an answer that rests on them.
Issue ground_issue(const Setting& setting);

/// What the parts share beyond the plan: computed once.
struct Patch {
    double along = 0.0, across = 0.0;  ///< half-widths, m
};

void add_wave(const Setting& setting, Answers& answers);
Patch add_patch(const Setting& setting, Answers& answers);
void add_pulse(const Setting& setting, Answers& answers);
void add_downwards(const Setting& setting, Answers& answers);
void add_sideways(const Setting& setting, Answers& answers);
void add_smallest(const Setting& setting, Answers& answers);
void add_pass(const Setting& setting, const Patch& patch, Answers& answers);
void add_lanes(const Setting& setting, const Patch& patch, Answers& answers);
void draw_beam(const Setting& setting, const Patch& patch, Answers& answers);
void draw_pulse(const Setting& setting, Answers& answers);

}  // namespace gg

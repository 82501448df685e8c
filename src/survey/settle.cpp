#include <algorithm>

#include "survey/section.hpp"
#include "survey/sideways.hpp"

namespace gg {

PairPicture::Verdict verdict_of(const Separation& separation) {
    using Verdict = PairPicture::Verdict;
    if (separation.known != Separation::Known::all && !separation.raw.apart())
        return separation.raw.depth > 0.0 ? Verdict::merging : Verdict::one;
    return separation.raw.apart() ? Verdict::apart : separation.focused.apart() ? Verdict::merging : Verdict::one;
}

void settle(Answers& answers, const Plan& plan, const Separation& separation) {
    if (separation.known != Separation::Known::all) return;
    if (!(separation.raw.lower_peak > 0.0) || answers.find("apart.focused")) return;
    const auto at = std::find_if(answers.list.begin(), answers.list.end(),
                                 [](const Answer& a) { return a.key == "apart.sideways"; });
    if (at == answers.list.end() || at->likely.issue == Issue::out_of_range) return;

    Answer measured = *at;
    measured.rules.push_back({"travel times and envelope, 19 percent dip", at->likely.value, "computed"});
    const double travel = at->likely.value;
    const auto becomes = [&](Answer& a, Value least) {
        const double ratio = least.ok() && travel > 0.0 ? least.value / travel : 0.0;
        a.likely = least.ok() ? least : Value{0.0, least.issue};
        a.low = std::min(a.likely.value, ratio * at->low);
        a.high = std::max(a.likely.value, ratio * at->high);
    };
    becomes(measured, separation.least_raw);
    measured.formula =
        "Measured in the full-wave section of two equal targets: smallest distance at which the dip between the two "
        "peaks, along the row of first arrivals, is deeper than noise and reading can fill (5 percent at least). The "
        "range keeps the ratio that travel times give it.";
    grade_sideways(measured, plan, separation.least_focused);

    Answer focused = measured;
    focused.key = "apart.focused";
    focused.name = "Told apart, focused";
    becomes(focused, separation.least_focused);
    focused.formula =
        "As told apart sideways, along the targets' depth after the hyperbolas are folded back (phase-shift migration "
        "with the likely speeds).";
    grade_sideways(focused, plan);
    focused.why = "Once focused: " + focused.why;
    *at = measured;
    answers.list.insert(at + 1, focused);

    answers.pair.verdict = verdict_of(separation);
    answers.pair.dip = separation.raw.depth;
}

Answers settled_answers_for(const Plan& plan) {
    Answers answers = answers_for(plan);
    const Plan pair = as_pair(plan);
    if (answers.faults.empty() && section_fault(pair).empty()) settle(answers, plan, separation_for(pair));
    return answers;
}

}  // namespace gg

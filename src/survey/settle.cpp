#include <algorithm>

#include "survey/section.hpp"
#include "survey/sideways.hpp"
#include "survey/words.hpp"

namespace gg {

/// A dip by chance below the least gap, from which on they are two, is none.
static bool parts(const Dip& dip, const Value& least, double gap) {
    constexpr double found = 0.97;  // least gaps are found to 3 %
    return dip.apart() && least.ok() && gap >= found * least.value;
}

PairPicture::Verdict verdict_of(const Separation& separation, double gap) {
    using Verdict = PairPicture::Verdict;
    const Dip& raw = separation.raw;
    if (separation.known == Separation::Known::dip ? raw.apart() : parts(raw, separation.least_raw, gap))
        return Verdict::apart;
    if (separation.known >= Separation::Known::likely)
        return parts(separation.focused, separation.least_focused, gap) ? Verdict::merging : Verdict::one;
    return raw.depth > 0.0 ? Verdict::merging : Verdict::one;
}

static constexpr std::string_view kept_ratio = " The range keeps the ratio that travel times give it.";

static Answer* find(Answers& answers, std::string_view key) {
    const auto at =
        std::find_if(answers.list.begin(), answers.list.end(), [&](const Answer& a) { return a.key == key; });
    return at == answers.list.end() ? nullptr : &*at;
}

/// The likely least gaps.
static void settle_likely(Answers& answers, const Plan& plan, const Separation& separation) {
    Answer& quick = *find(answers, "apart.sideways");
    Answer measured = quick;
    const double travel = quick.likely.value;
    measured.rules.push_back({"travel times and envelope, 19 percent dip", travel, "computed"});
    const auto becomes = [&](Answer& a, Value least) {
        const double ratio = least.ok() && travel > 0.0 ? least.value / travel : 0.0;
        a.likely = least.ok() ? least : Value{0.0, least.issue};
        a.low = std::min(a.likely.value, ratio * quick.low);
        a.high = std::max(a.likely.value, ratio * quick.high);
    };
    becomes(measured, separation.least_raw);
    measured.formula =
        "Measured in the full-wave section of two equal targets: smallest distance at which the dip between the two "
        "peaks, along the row of first arrivals, is deeper than noise and reading can fill (5 percent at least).";
    measured.formula += kept_ratio;
    grade_sideways(measured, plan, separation.least_focused);

    Answer focused = measured;
    focused.key = "apart.focused";
    focused.name = "Told apart, focused";
    becomes(focused, separation.least_focused);
    focused.formula =
        "As told apart sideways, along the targets' depth after the hyperbolas are folded back (phase-shift migration "
        "with the likely speeds).";
    focused.formula += kept_ratio;
    grade_sideways(focused, plan);
    focused.why = "Once focused: " + focused.why;
    quick = measured;
    answers.list.insert(answers.list.begin() + (&quick - answers.list.data()) + 1, focused);
    answers.pair.verdict = verdict_of(separation, plan.target.gap);
    answers.pair.dip = separation.raw.depth;
}

/// Their ends over all that is possible, and what was measured downwards.
static void settle_ranges(Answers& answers, const Plan& plan, const Separation& separation) {
    const auto widen = [&](Answer& a, const Spread& spread) {
        a.low = std::min(a.likely.value, spread.low);
        a.high = std::max(a.likely.value, spread.high);
        if (const std::size_t at = a.formula.find(kept_ratio); at != std::string::npos)
            a.formula.replace(at, kept_ratio.size(), " The range: the same in every ground and depth held possible.");
    };
    Answer &raw = *find(answers, "apart.sideways"), &focused = *find(answers, "apart.focused");
    widen(raw, separation.range_raw);
    widen(focused, separation.range_focused);
    grade_sideways(raw, plan, separation.least_focused);
    grade_sideways(focused, plan);
    focused.why = "Once focused: " + focused.why;

    const Answer* down = find(answers, "apart.down");
    const auto add_down = [&](std::string key, std::string name, const Spread& spread, std::string why,
                              std::string formula) {
        Answer a;
        a.key = std::move(key);
        a.name = std::move(name);
        a.group = Group::downwards;
        a.quantity = Quantity::length;
        a.likely = spread.likely.ok() ? spread.likely : Value{0.0, spread.likely.issue};
        a.low = std::min(a.likely.value, spread.low);
        a.high = std::max(a.likely.value, spread.high);
        a.why = std::move(why);
        a.formula = std::move(formula);
        if (down) a.rules = down->rules;
        return a;
    };
    const auto length = [](const Spread& spread) { return token(spread.likely.value, Quantity::length); };
    std::vector<Answer> more;
    more.push_back(add_down(
        "apart.above", "One above the other", separation.above,
        separation.above.likely.ok()
            ? "Two such targets one above the other show as two from " + length(separation.above) + " centre to centre."
            : std::string(
                  "Of two such targets one above the other the lower stays hidden at any distance in this layer."),
        "Measured in the full-wave trace straight above: smallest distance at which the dip between the two echoes' "
        "peaks is deeper than noise and reading can fill. The range: the same in every ground and depth held "
        "possible."));
    if (plan.target.filling != Filling::metal)
        more.push_back(add_down(
            "apart.through", "Top and bottom of one", separation.through,
            separation.through.likely.ok()
                ? "Such a target gives its top and its bottom as two echoes from " + length(separation.through) +
                      " across."
                : std::string("Top and bottom of such a target stay one echo at any size that fits its layer."),
            "Measured in the full-wave trace straight above one target whose size is changed, its "
            "top kept: as one above "
            "the other."));
    const auto after = down ? answers.list.begin() + (down - answers.list.data()) + 1 : answers.list.end();
    answers.list.insert(after, more.begin(), more.end());
}

void settle(Answers& answers, const Plan& plan, const Separation& separation) {
    if (separation.known < Separation::Known::likely || !(separation.raw.lower_peak > 0.0)) return;
    const Answer* quick = answers.find("apart.sideways");
    if (!quick) return;
    if (!answers.find("apart.focused")) {
        if (quick->likely.issue == Issue::out_of_range) return;
        settle_likely(answers, plan, separation);
    }
    if (separation.known == Separation::Known::all && !answers.find("apart.above"))
        settle_ranges(answers, plan, separation);
}

Answers settled_answers_for(const Plan& plan) {
    Answers answers = answers_for(plan);
    const Plan pair = as_pair(plan);
    if (answers.faults.empty() && section_fault(pair).empty()) {
        Separation separation = separation_for(pair);
        add_ranges(separation, pair);
        settle(answers, plan, separation);
    }
    return answers;
}

}  // namespace gg

#include "draw/pair_words.hpp"

#include <cmath>

#include "draw/parts.hpp"

namespace gg {

std::string gain_words(Gain gain) {
    switch (gain) {
        case Gain::recorded:
            return "as recorded";
        case Gain::even:
            return "even gain";
        case Gain::strong:
            return "strong gain";
    }
    return {};
}

/// What travel times alone tell, m: the answer itself, or the rule beside it once the section was measured (settle()).
static double by_travel_times(const Answer& sideways, bool settled) {
    return settled && !sideways.rules.empty() ? sideways.rules.back().value : sideways.likely.value;
}

static bool knows(const PairSection& seen, Separation::Known what) {
    return seen.separation && seen.separation->known >= what;
}

bool PairWords::measured() const { return seen && seen->separation && seen->separation->raw.lower_peak > 0; }

PairPicture::Verdict PairWords::verdict() const {
    return measured() ? verdict_of(*seen->separation, gap()) : answers.pair.verdict;
}

/// What was measured was so at the section's own gap, if that is of an earlier state of the plan.
double PairWords::gap() const {
    if (!measured() || seen->scene.targets.size() < 2) return plan.target.gap;
    return std::abs(seen->scene.targets[0].x - seen->scene.targets[1].x);
}

std::string PairWords::sentence() const {
    std::string out = "Two at ";
    out += say(gap(), Quantity::length, units);
    switch (verdict()) {
        case PairPicture::Verdict::apart:
            return out += " show as two.";
        case PairPicture::Verdict::merging:
            return out += measured() && knows(*seen, Separation::Known::likely) ? " part only once focused."
                                                                                : " run together.";
        case PairPicture::Verdict::one:
            return out += " look like one.";
    }
    return out;
}

std::string PairWords::least() const {
    const auto said = [&](double v) { return say(v, Quantity::length, units); };
    std::string out = "They part from ";
    if (measured() && knows(*seen, Separation::Known::raw)) {
        const bool both = knows(*seen, Separation::Known::likely);
        const Value raw = seen->separation->least_raw, focused = seen->separation->least_focused;
        if (!raw.ok() && !both) return "Raw, they part at no gap.";
        if (!raw.ok() && !focused.ok()) return "They part at no gap.";
        if (raw.ok()) out += said(raw.value) + " raw";
        if (raw.ok() && both && focused.ok()) out += ", ";
        if (both && focused.ok()) out += said(focused.value) + " focused";
        return out += '.';
    }
    const Answer* sideways = answers.find("apart.sideways");
    const double travel = sideways ? by_travel_times(*sideways, answers.find("apart.focused") != nullptr) : 0.0;
    if (!(travel > 0)) return {};
    if (seen) out = "By travel times from ";
    return out += said(travel) + ".";
}

std::string PairWords::least_in_brief() const {
    constexpr std::string_view start = "They part from";
    std::string out = least();
    return out.starts_with(start) ? "From" + out.substr(start.size()) : out;
}

std::string PairWords::rules() const {
    const Answer* sideways = answers.find("apart.sideways");
    if (!sideways) return {};
    const bool settled = answers.find("apart.focused") != nullptr;
    std::string out = "By travel times ";
    out += say(by_travel_times(*sideways, settled), Quantity::length, units);
    for (std::size_t i = 0; i + (settled ? 1 : 0) < sideways->rules.size(); ++i) {
        const Rule& rule = sideways->rules[i];
        out += "; ";
        out += rule.name + " " + say(rule.value, Quantity::length, units);
    }
    return out += '.';
}

std::string PairWords::turning() const { return seen ? spell(seen->turning.words, units) : std::string(); }

std::string PairWords::turning_in_brief() const {
    if (!seen || !(std::abs(seen->turning.along_db) >= 1.0) || plan.target.shape == TargetShape::compact) return {};
    std::string out = seen->turning.better == Polarisation::along ? "Field along: " : "Field across: ";
    return out += say(0.5 * std::round(2.0 * std::abs(seen->turning.along_db)), Quantity::loss, units) + " stronger";
}

std::string PairWords::description() const {
    std::string out = "Two neighbours ";
    out += say(plan.target.depth.likely, Quantity::length, units) + " deep: " + std::string(word_for(verdict())) + ". ";
    out += sentence() + " " + least();
    if (!seen) return out;
    out += " ";
    out += rules() + " " + turning();
    return out += " Shapes and times are true; strength against depth, computed in two dimensions, is no power budget.";
}

}  // namespace gg

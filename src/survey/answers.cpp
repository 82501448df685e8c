#include "survey/answers.hpp"

#include <utility>

#include "survey/parts.hpp"

namespace gg {
namespace {

/// Answers that rest on a part of the plan which had to be moved into range are stand-ins, and say why.
void tell(Answers& answers, const Sane& sane) {
    for (Answer& a : answers.list) {
        const bool pass = a.group == Group::pass, lanes = a.group == Group::lanes;
        const std::string* told = nullptr;
        for (const std::string* s : {&sane.antenna, &sane.ground, &sane.target}) {
            if (!s->empty()) told = s;
        }
        if (a.key.starts_with("layer.") && told == &sane.target) told = nullptr;
        if (pass && !sane.pass.empty()) told = &sane.pass;
        if (lanes && !sane.lanes.empty()) told = &sane.lanes;
        if (told == nullptr) continue;
        a.likely.issue = Issue::out_of_range;
        a.grade = Grade::none;
        a.mends.clear();
        a.why = *told + " This number was computed with the nearest value that makes sense.";
    }
}

}  // namespace

Answer& add(Answers& answers, Group group, std::string key, std::string name, Quantity quantity, const Spread& spread) {
    Answer a;
    a.key = std::move(key);
    a.name = std::move(name);
    a.group = group;
    a.quantity = quantity;
    a.likely = spread.likely;
    a.low = spread.low;
    a.high = spread.high;
    answers.list.push_back(std::move(a));
    return answers.list.back();
}

Issue ground_issue(const Setting& setting) {
    const Case& c = setting.likely();
    Issue worst = Issue::none;
    for (int i = 0; i <= c.layer; ++i) {
        const Issue issue = c.ground->waves[i].issue;
        if (issue == Issue::none || worst == Issue::model_fails) continue;
        worst = issue == Issue::outside_band ? Issue::outside_band : Issue::model_fails;
    }
    return worst;
}

const Answer* Answers::find(std::string_view key) const {
    for (const Answer& a : list) {
        if (a.key == key) return &a;
    }
    return nullptr;
}

Answers answers_for(const Plan& plan) {
    const Sane sane = make_sane(plan);
    const Cases cases = cases_of(sane.plan);
    const Setting setting{sane.plan, cases, band_of(sane.plan.antenna.pulse, 10.0)};
    Answers answers;
    answers.list.reserve(80);
    answers.faults = faults_of(plan);
    add_wave(setting, answers);
    const Patch patch = add_patch(setting, answers);
    add_pulse(setting, answers);
    add_downwards(setting, answers);
    add_sideways(setting, answers);
    add_smallest(setting, answers);
    add_pass(setting, patch, answers);
    add_lanes(setting, patch, answers);
    draw_beam(setting, patch, answers);
    draw_pulse(setting, answers);

    const Issue issue = ground_issue(setting);
    for (Answer& a : answers.list) {
        // A layer's own answers carry its own issue; what only counts lines does not rest on the ground.
        if (issue == Issue::none || a.key.starts_with("layer.") || a.quantity == Quantity::count) continue;
        if (a.likely.issue == Issue::none) a.likely.issue = Issue::outside_band;
        if (a.group != Group::pulse) continue;
        a.why += ' ';
        a.why += sentence(issue);
    }
    tell(answers, sane);
    return answers;
}

std::string_view word_for(Grade grade) {
    switch (grade) {
        case Grade::none:
            return "";
        case Grade::good:
            return "good";
        case Grade::thin:
            return "thin";
        case Grade::poor:
            return "poor";
    }
    return "";
}

std::string_view word_for(PairPicture::Verdict verdict) {
    switch (verdict) {
        case PairPicture::Verdict::one:
            return "one";
        case PairPicture::Verdict::merging:
            return "merging";
        case PairPicture::Verdict::apart:
            return "apart";
    }
    return "";
}

}  // namespace gg

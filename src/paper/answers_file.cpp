#include "draw/units.hpp"
#include "paper/json.hpp"
#include "paper/plan_file.hpp"
#include "survey/answers.hpp"

namespace gg {

namespace {

constexpr int answers_schema = 1;

const char* name_of(Group group) {
    switch (group) {
        case Group::wave:
            return "wave";
        case Group::patch:
            return "lit patch";
        case Group::pulse:
            return "pulse";
        case Group::downwards:
            return "told apart downwards";
        case Group::sideways:
            return "told apart sideways";
        case Group::smallest:
            return "smallest size";
        case Group::pass:
            return "pass";
        case Group::lanes:
            return "lanes";
    }
    return "";
}

/// The value as a person would say it, with its range where there is one; the reason where there is none.
std::string says(const Answer& answer, UnitSystem units) {
    if (!answer.likely.ok()) return std::string(sentence(answer.likely.issue));
    const auto words = [&](double value) { return say(value, answer.quantity, units); };
    const std::string likely = words(answer.likely.value), low = words(answer.low), high = words(answer.high);
    return low == high ? likely : likely + " (" + low + " to " + high + ")";
}

Json one(const Answer& answer, UnitSystem units) {
    const auto said = [units](const std::string& words) { return spell(words, units); };
    Json json;
    json["key"] = answer.key;
    json["name"] = answer.name;
    json["group"] = name_of(answer.group);
    json["unit"] = si_unit(answer.quantity);
    const bool ok = answer.likely.ok();
    json["value"] = ok ? Json(answer.likely.value) : Json();
    json["low"] = ok ? Json(answer.low) : Json();
    json["high"] = ok ? Json(answer.high) : Json();
    json["says"] = says(answer, units);
    if (answer.likely.issue != Issue::none) json["issue"] = sentence(answer.likely.issue);
    if (answer.grade != Grade::none) json["grade"] = word_for(answer.grade);
    json["why"] = said(answer.why);
    json["formula"] = said(answer.formula);
    json["rules"] = Json::array();
    for (const Rule& rule : answer.rules)
        json["rules"].push_back({{"name", said(rule.name)}, {"value", rule.value}, {"source", rule.source}});
    json["mends"] = Json::array();
    for (const Mend& mend : answer.mends)
        json["mends"].push_back({{"words", said(mend.words)}, {"field", mend.field}, {"value", mend.value}});
    return json;
}

}  // namespace

std::string write_answers(const Plan& plan, const Answers& answers, UnitSystem units) {
    Json root;
    root["schema"] = answers_schema;
    root["plan"] = plan.name;
    root["caution"] = caution();
    root["faults"] = Json::array();
    for (const std::string& fault : answers.faults) root["faults"].push_back(spell(fault, units));
    root["answers"] = Json::array();
    for (const Answer& answer : answers.list) root["answers"].push_back(one(answer, units));
    return root.dump(2, ' ', false, Json::error_handler_t::replace) + "\n";
}

}  // namespace gg

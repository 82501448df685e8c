#pragma once
/// Plan files: JSON with an integer schema. Documented in DEVELOPERS.md.
#include <string>
#include <string_view>
#include <vector>

#include "draw/units.hpp"
#include "survey/plan.hpp"

namespace gg {

constexpr int plan_schema = 1;

struct ReadPlan {
    Plan plan;
    std::vector<std::string> faults;  ///< sentences, each with the key it is about; not empty: `plan` is not to be used
    std::vector<std::string> notes;   ///< what was odd but could be read (an unknown key, a value clamped)
    bool ok() const { return faults.empty(); }
};

/// Any bytes in; never throws. A newer schema is refused politely.
ReadPlan read_plan(std::string_view json);
/// Pretty, stable order, shortest digits that read back to the same number: read_plan(write_plan(p)).plan == p.
std::string write_plan(const Plan& plan);

/// Demo plans that ship inside the program: assets/demo-*.json.
struct Demo {
    std::string id, name, json;
};
const std::vector<Demo>& demos();

/// Answers as JSON: schema, plan name, list of answers with SI values and units, faults, caution. Its sentences (and
/// "says", the value in words) are in `units`.
std::string write_answers(const Plan& plan, const struct Answers& answers, UnitSystem units = UnitSystem::metric);

/// The caution that stands on every output.
std::string_view caution();

}  // namespace gg

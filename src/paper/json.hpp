#pragma once
/// What the files of this room share: where a field of the plan stands in the JSON, and the names of units.
#include <nlohmann/json.hpp>
#include <string>

#include "survey/fields.hpp"

namespace gg {

using Json = nlohmann::ordered_json;

/// Place of a dotted key: "ground.0.water" stands at /ground/0/water. Angles stand in degrees, and their keys say so.
std::string dotted_in_file(const Field& field);
Json::json_pointer pointer_to(std::string dotted);

/// "m", "s", "Hz", "Np/m"...; empty for bare numbers. Angles are in radians everywhere but in plan files.
std::string_view si_unit(Quantity quantity);

}  // namespace gg

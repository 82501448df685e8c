#pragma once
/// One table of the plan's fields: load, save, forms, drags, mends and limits all read it.
/// Keys are dotted: "target.depth", "ground.0.thickness", "ground.1.water.high", "antenna.frequency", "pass.step".
/// A range's bare key means its likely value; ".low" and ".high" its ends.
#include <functional>
#include <optional>
#include <string>
#include <vector>

#include "survey/plan.hpp"

namespace gg {

/// What kind of quantity a number is: how it is shown and typed (the factor to SI lives in ui and paper).
enum class Quantity : std::uint8_t {
    none,          ///< bare number
    length,        ///< m; shown as m or mm / ft or in
    small_length,  ///< m; shown in mm or cm / in
    time,          ///< s; shown in ns
    frequency,     ///< Hz; MHz or GHz
    speed,         ///< m/s; m/ns
    attenuation,   ///< Np/m; dB/m
    loss,          ///< dB
    conductivity,  ///< S/m; mS/m
    permittivity,  ///< relative
    fraction,      ///< 0..1; percent
    temperature,   ///< degrees Celsius
    salinity,      ///< g/kg
    density,       ///< kg/m3
    angle,         ///< rad; degrees
    count,         ///< integer
    rate,          ///< 1/s
    ratio,         ///< bare ratio
    impedance      ///< ohm
};

/// One number of a plan. `low`/`high` are legal limits, `step` what [-] and [+] move by.
struct Field {
    std::string key;    ///< dotted
    std::string label;  ///< "Depth to top"
    Quantity quantity = Quantity::none;
    double low = 0.0, high = 0.0, step = 0.0;
    bool is_range = false;  ///< has .low and .high beside it
    bool derived = false;   ///< follows from another part of the plan: not filed
};

/// Every number field of this plan, in file order. The list depends on the plan: layers, the inputs their models take.
std::vector<Field> fields_of(const Plan& plan);
/// The field of that key (with or without .low/.high), or nothing.
std::optional<Field> find_field(const Plan& plan, std::string_view key);
/// Value by key, SI.
std::optional<double> number_at(const Plan& plan, std::string_view key);

/// Sets a number by key. Returns empty on success, else one sentence that says what is wrong and what would be right;
/// the plan is then unchanged. Setting a likely value past an end of its range moves that end along.
/// Whole-number fields are rounded, angles are wrapped into one turn (a half turn for the target's) and kept to 1e-9 of
/// a degree, other numbers are kept to 12 digits: what is shown, kept and filed is then the same number. "lanes.width"
/// and "lanes.height" stretch the site's outline to that extent. Numbers in sentences stand as tokens
/// (survey/words.hpp).
std::string set_number(Plan& plan, std::string_view key, double value);

/// One choice of a plan: "target.filling", "target.shape", "antenna.family", "ground.N.material", "lanes.both_ways".
struct Choice {
    std::string key, label;
    struct Option {
        std::string id, name;
    };
    std::vector<Option> options;
};
std::vector<Choice> choices_of(const Plan& plan);
std::optional<std::string> choice_at(const Plan& plan, std::string_view key);
/// Sets a choice by option id; a material choice resets that layer's inputs to the catalogue's ranges. Same return as
/// above.
std::string set_choice(Plan& plan, std::string_view key, std::string_view option);

constexpr int most_layers = 8;
/// Splits layer `above` in two: a copy of it, of the same thickness, comes in below. Same return as set_number.
std::string add_layer(Plan& plan, int above);
std::string remove_layer(Plan& plan, int index);

/// The plan with every part that it does not use at rest (the last layer's thickness, inputs that a material does not
/// take, the own filling of a target that has none) and its numbers kept as set_number keeps them. All setters keep a
/// plan so.
Plan at_rest(Plan plan);

/// Numbers outside their limits, or ranges out of order: a part of faults_of.
std::vector<std::string> number_faults(const Plan& plan);
/// Everything wrong with a plan, one sentence each; empty means it can be computed as it stands.
std::vector<std::string> faults_of(const Plan& plan);

}  // namespace gg

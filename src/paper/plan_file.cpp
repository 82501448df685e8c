#include "paper/plan_file.hpp"

#include <algorithm>
#include <cmath>

#include "paper/json.hpp"
#include "wave/embedded.hpp"

namespace gg {

namespace {

/// Degrees of an angle as the field table keeps it, to 1e-9: reads back to the same radians.
double in_degrees(double radians) { return std::round(radians * (180 / pi) * 1e9) / 1e9; }

}  // namespace

std::string dotted_in_file(const Field& field) {
    return field.quantity == Quantity::angle ? field.key + "_deg" : field.key;
}

Json::json_pointer pointer_to(std::string dotted) {
    std::replace(dotted.begin(), dotted.end(), '.', '/');
    return Json::json_pointer("/" + dotted);
}

std::string_view si_unit(Quantity quantity) {
    switch (quantity) {
        case Quantity::length:
        case Quantity::small_length:
            return "m";
        case Quantity::time:
            return "s";
        case Quantity::frequency:
            return "Hz";
        case Quantity::speed:
            return "m/s";
        case Quantity::attenuation:
            return "Np/m";
        case Quantity::loss:
            return "dB";
        case Quantity::conductivity:
            return "S/m";
        case Quantity::temperature:
            return "degC";
        case Quantity::salinity:
            return "g/kg";
        case Quantity::density:
            return "kg/m3";
        case Quantity::angle:
            return "rad";
        case Quantity::rate:
            return "1/s";
        case Quantity::impedance:
            return "ohm";
        case Quantity::none:
        case Quantity::permittivity:
        case Quantity::fraction:
        case Quantity::count:
        case Quantity::ratio:
            break;
    }
    return "";
}

std::string write_plan(const Plan& any_plan) {
    const Plan plan = at_rest(any_plan);
    Json root;
    root["schema"] = plan_schema;
    root["name"] = plan.name;
    if (!plan.note.empty()) root["note"] = plan.note;
    root["ground"] = Json::array();
    for (const char* section : {"target", "antenna", "pass", "lanes", "need"}) root[section] = Json::object();

    for (const Choice& choice : choices_of(plan))
        root[pointer_to(choice.key)] = choice_at(plan, choice.key).value_or("");
    for (const Field& field : fields_of(plan)) {
        if (field.derived) continue;
        const double likely = number_at(plan, field.key).value_or(0.0);
        Json& slot = root[pointer_to(dotted_in_file(field))];
        if (field.quantity == Quantity::angle)
            slot = in_degrees(likely);
        else if (field.quantity == Quantity::count)
            slot = static_cast<int>(likely);
        else
            slot = likely;
        if (!field.is_range) continue;
        const double low = number_at(plan, field.key + ".low").value_or(likely);
        const double high = number_at(plan, field.key + ".high").value_or(likely);
        if (low != likely || high != likely) slot = {low, likely, high};
    }
    for (const SitePoint& corner : plan.lanes.outline) root["lanes"]["outline"].push_back({corner.x, corner.y});
    // Text that is not UTF-8 cannot come from a file; from a keyboard it is written with replacement marks.
    return root.dump(2, ' ', false, Json::error_handler_t::replace) + "\n";
}

const std::vector<Demo>& demos() {
    static const std::vector<Demo> all = [] {
        std::vector<Demo> list;
        for (const embedded::File& file : embedded::demo_files_json()) {
            std::string_view id = file.name;  // "demo-1-yard-pipe.json"
            id = id.substr(0, id.rfind('.'));
            for (int dash = 0; dash < 2; ++dash) id = id.substr(id.find('-') + 1);
            list.push_back({std::string(id), read_plan(file.bytes).plan.name, std::string(file.bytes)});
        }
        return list;
    }();
    return all;
}

std::string_view caution() {
    return "A survey cannot prove that nothing is there. Dig, core and cut by local codes and with licensed practice.";
}

}  // namespace gg

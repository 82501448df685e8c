#include "ui/preferences.hpp"

#include <algorithm>
#include <nlohmann/json.hpp>

namespace gg {

static constexpr std::size_t remembered = 4;
static constexpr const char* theme_ids[] = {"system", "light", "dark"};

void Preferences::used(const std::string& kind, const std::string& option) {
    std::vector<std::string>& list = recent[kind];
    list.erase(std::remove(list.begin(), list.end(), option), list.end());
    list.insert(list.begin(), option);
    if (list.size() > remembered) list.resize(remembered);
}

std::string write_preferences(const Preferences& preferences) {
    nlohmann::ordered_json json;
    json["units"] = preferences.units == UnitSystem::imperial ? "imperial" : "metric";
    json["theme"] = theme_ids[static_cast<int>(preferences.theme)];
    json["text_scale"] = preferences.text_scale;
    json["hint_seen"] = preferences.hint_seen;
    json["recent"] = preferences.recent;
    return json.dump(-1, ' ', false, nlohmann::ordered_json::error_handler_t::replace);
}

Preferences read_preferences(std::string_view text) {
    Preferences out;
    const nlohmann::json json = nlohmann::json::parse(text, nullptr, false);
    if (!json.is_object()) return out;
    const auto text_of = [&](const char* key) {
        const auto found = json.find(key);
        return found != json.end() && found->is_string() ? found->get<std::string>() : std::string();
    };
    if (text_of("units") == "imperial") out.units = UnitSystem::imperial;
    for (int i = 0; i < 3; ++i)
        if (text_of("theme") == theme_ids[i]) out.theme = static_cast<Theme>(i);
    if (const auto scale = json.find("text_scale"); scale != json.end() && scale->is_number()) {
        const double value = scale->get<double>();
        if (value >= 1.0 && value <= 2.0) out.text_scale = value;
    }
    if (const auto seen = json.find("hint_seen"); seen != json.end() && seen->is_boolean())
        out.hint_seen = seen->get<bool>();
    if (const auto recent = json.find("recent"); recent != json.end() && recent->is_object())
        for (const auto& [kind, list] : recent->items()) {
            if (!list.is_array()) continue;
            for (auto option = list.rbegin(); option != list.rend(); ++option)
                if (option->is_string()) out.used(kind, option->get<std::string>());
        }
    return out;
}

}  // namespace gg

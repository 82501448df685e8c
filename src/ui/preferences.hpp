#pragma once
/// What a person likes, apart from any plan: kept on the device.
#include <map>
#include <string>
#include <string_view>
#include <vector>

#include "draw/units.hpp"

namespace gg {

enum class Theme : std::uint8_t { system, light, dark };

struct Preferences {
    UnitSystem units = UnitSystem::metric;
    Theme theme = Theme::system;
    double text_scale = 1.0;  ///< 1 to 2
    bool hint_seen = false;   ///< something on a picture was dragged once
    std::map<std::string, std::vector<std::string>>
        recent;  ///< per kind of list, option ids, last used first, at most 4

    /// Puts `option` first among those last used in lists of `kind`.
    void used(const std::string& kind, const std::string& option);
    bool operator==(const Preferences&) const = default;
};

std::string write_preferences(const Preferences& preferences);
/// Any bytes; what cannot be read keeps its default.
Preferences read_preferences(std::string_view json);

}  // namespace gg

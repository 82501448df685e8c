#include "draw/units.hpp"

#include <algorithm>
#include <array>
#include <cctype>
#include <cmath>
#include <cstdio>
#include <locale>
#include <span>
#include <sstream>

#include "wave/constants.hpp"

namespace gg {
namespace {

/// One way to write a quantity: si = number * factor + offset. Written from `from` (in magnitude, SI) up to the next
/// unit's.
struct Unit {
    const char* name;
    double factor, offset, from;
};

constexpr double inch = 0.0254, foot = 0.3048,
                 mile = 1609.344;  // m, exact (international yard and pound agreement, 1959)
constexpr double pound_per_cubic_foot = 0.45359237 / (foot * foot * foot);

constexpr std::array length_metric{Unit{"mm", 1e-3, 0, 0}, Unit{"m", 1, 0, 0.1}, Unit{"km", 1e3, 0, 1e4}};
constexpr std::array length_imperial{Unit{"in", inch, 0, 0}, Unit{"ft", foot, 0, 3 * foot},
                                     Unit{"mi", mile, 0, 5 * mile}};
constexpr std::array small_metric{Unit{"mm", 1e-3, 0, 0}, Unit{"m", 1, 0, 1.0}};
constexpr std::array time_units{Unit{"ns", 1e-9, 0, 0}, Unit{"us", 1e-6, 0, 1e-5}, Unit{"s", 1, 0, 0.01},
                                Unit{"min", 60, 0, 120}, Unit{"h", 3600, 0, 7200}};
constexpr std::array frequency_units{Unit{"MHz", 1e6, 0, 0}, Unit{"GHz", 1e9, 0, 1e9}};
constexpr std::array speed_metric{Unit{"m/ns", 1e9, 0, 0}};
constexpr std::array speed_imperial{Unit{"ft/ns", foot * 1e9, 0, 0}};
constexpr std::array attenuation_metric{Unit{"dB/m", 1 / decibel_per_neper, 0, 0}};
constexpr std::array attenuation_imperial{Unit{"dB/ft", 1 / (decibel_per_neper * foot), 0, 0}};
constexpr std::array loss_units{Unit{"dB", 1, 0, 0}};
constexpr std::array conductivity_units{Unit{"mS/m", 1e-3, 0, 0}, Unit{"S/m", 1, 0, 1}};
constexpr std::array fraction_units{Unit{"%", 0.01, 0, 0}};
constexpr std::array temperature_metric{Unit{"\u00b0C", 1, 0, 0}};
constexpr std::array temperature_imperial{Unit{"\u00b0F", 5.0 / 9.0, -160.0 / 9.0, 0}};
constexpr std::array salinity_units{Unit{"g/kg", 1, 0, 0}};
constexpr std::array density_metric{Unit{"kg/m\u00b3", 1, 0, 0}};
constexpr std::array density_imperial{Unit{"lb/ft\u00b3", pound_per_cubic_foot, 0, 0}};
constexpr std::array angle_units{Unit{"\u00b0", pi / 180, 0, 0}};
constexpr std::array rate_units{Unit{"/s", 1, 0, 0}};
constexpr std::array impedance_units{Unit{"ohm", 1, 0, 0}};
constexpr std::array bare_units{Unit{"", 1, 0, 0}};

std::span<const Unit> units_of(Quantity quantity, UnitSystem units) {
    const bool metric = units == UnitSystem::metric;
    switch (quantity) {
        case Quantity::length:
            return metric ? std::span<const Unit>(length_metric) : length_imperial;
        case Quantity::small_length:
            return metric ? std::span<const Unit>(small_metric) : length_imperial;
        case Quantity::time:
            return time_units;
        case Quantity::frequency:
            return frequency_units;
        case Quantity::speed:
            return metric ? speed_metric : speed_imperial;
        case Quantity::attenuation:
            return metric ? attenuation_metric : attenuation_imperial;
        case Quantity::loss:
            return loss_units;
        case Quantity::conductivity:
            return conductivity_units;
        case Quantity::fraction:
            return fraction_units;
        case Quantity::temperature:
            return metric ? temperature_metric : temperature_imperial;
        case Quantity::salinity:
            return salinity_units;
        case Quantity::density:
            return metric ? density_metric : density_imperial;
        case Quantity::angle:
            return angle_units;
        case Quantity::rate:
            return rate_units;
        case Quantity::impedance:
            return impedance_units;
        case Quantity::none:
        case Quantity::permittivity:
        case Quantity::count:
        case Quantity::ratio:
            break;
    }
    return bare_units;
}

const Unit& unit_for(double si, std::span<const Unit> list) {
    const Unit* chosen = &list.front();
    for (const Unit& unit : list) {
        // A hair under the border counts as on it: 0.0999999 m is said in metres, not as 100 mm.
        if (std::abs(si) * (1 + 1e-6) >= unit.from) chosen = &unit;
    }
    return *chosen;
}

std::string fixed(double x, int decimals) {
    char text[400];
    std::snprintf(text, sizeof text, "%.*f", decimals, x);
    const std::string words = text;
    // "-0.00" says nothing that "0.00" does not.
    return words.find_first_of("123456789") == std::string::npos && words[0] == '-' ? words.substr(1) : words;
}

std::string without_trailing_zeros(std::string words) {
    if (words.find('.') == std::string::npos) return words;
    words.erase(words.find_last_not_of('0') + 1);
    if (words.back() == '.') words.pop_back();
    return words;
}

std::string significant(double x, int digits) {
    if (x == 0.0) return "0";
    const double size = std::floor(std::log10(std::abs(x)) + 1e-12);
    if (size > 11 || size < -9) {
        char text[40];
        std::snprintf(text, sizeof text, "%.*g", digits, x);
        return text;
    }
    const int decimals = digits - 1 - static_cast<int>(size);
    if (decimals >= 0) return without_trailing_zeros(fixed(x, decimals));
    return fixed(x, 0);
}

std::string joined(const std::string& number, std::string_view unit) {
    if (unit.empty()) return number;
    const bool close = unit == "%" || unit == "/s" || unit == "\u00b0";
    return number + (close ? "" : " ") + std::string(unit);
}

bool is_metre(const Unit& unit) { return std::string_view(unit.name) == "m"; }

std::string lower_trimmed(std::string_view words) {
    std::string out;
    for (const char c : words) {
        if (c == ' ' || c == '\t') continue;
        out += static_cast<char>(std::tolower(static_cast<unsigned char>(c)));
    }
    return out;
}

/// Units that are read though never written.
struct Spoken {
    Quantity quantity;
    const char* name;
    double factor;
};
constexpr std::array spoken{
    Spoken{Quantity::length, "cm", 0.01},     Spoken{Quantity::small_length, "cm", 0.01},
    Spoken{Quantity::length, "\"", inch},     Spoken{Quantity::small_length, "\"", inch},
    Spoken{Quantity::length, "'", foot},      Spoken{Quantity::small_length, "'", foot},
    Spoken{Quantity::time, "\u00b5s", 1e-6},  Spoken{Quantity::time, "ms", 1e-3},
    Spoken{Quantity::frequency, "khz", 1e3},  Spoken{Quantity::frequency, "hz", 1},
    Spoken{Quantity::angle, "deg", pi / 180}, Spoken{Quantity::angle, "rad", 1},
    Spoken{Quantity::temperature, "c", 1},    Spoken{Quantity::density, "kg/m3", 1},
    Spoken{Quantity::density, "g/cm3", 1000}, Spoken{Quantity::density, "lb/ft3", pound_per_cubic_foot},
    Spoken{Quantity::rate, "hz", 1}};

}  // namespace

std::string say(double si, Quantity quantity, UnitSystem units) {
    if (!std::isfinite(si)) return "not known";
    const Unit& unit = unit_for(si, units_of(quantity, units));
    const double x = (si - unit.offset) / unit.factor;
    if (quantity == Quantity::count) return fixed(x, 0);
    if (quantity == Quantity::angle || quantity == Quantity::temperature) return joined(fixed(x, 0), unit.name);
    // Metres under ten always show centimetres, "0.90 m", so that a dragged number does not change its length.
    if (is_metre(unit) && std::abs(x) < 9.995) return joined(fixed(x, 2), unit.name);
    // Below a hundredth of a percent the digits say nothing any more.
    if (quantity == Quantity::fraction && x > 0.0 && x < 0.01) return "<0.01%";
    // Millimetres that stand for a length under a tenth of a metre are whole; a bar's or a step's may be 12.5.
    const int digits = quantity == Quantity::length && std::string_view(unit.name) == "mm" ? 2 : 3;
    return joined(significant(x, digits), unit.name);
}

std::string say_exactly(double si, Quantity quantity, UnitSystem units) {
    if (!std::isfinite(si)) return "not known";
    const Unit& unit = unit_for(si, units_of(quantity, units));
    return joined(significant((si - unit.offset) / unit.factor, 6), unit.name);
}

TypedUnit typed_unit(Quantity quantity, UnitSystem units) {
    const bool metric = units == UnitSystem::metric;
    const std::span<const Unit> list = units_of(quantity, units);
    const Unit& unit = quantity == Quantity::length ? list[1] : list.front();
    int decimals = 2;
    switch (quantity) {
        case Quantity::small_length:
            decimals = metric ? 0 : 2;
            break;
        case Quantity::time:
        case Quantity::fraction:
        case Quantity::temperature:
        case Quantity::salinity:
        case Quantity::loss:
        case Quantity::conductivity:
            decimals = 1;
            break;
        case Quantity::speed:
            decimals = 3;
            break;
        case Quantity::frequency:
        case Quantity::angle:
        case Quantity::count:
        case Quantity::density:
        case Quantity::rate:
        case Quantity::impedance:
            decimals = 0;
            break;
        default:
            break;
    }
    return {unit.name, unit.factor, unit.offset, decimals};
}

std::optional<double> read_number(std::string_view typed, Quantity quantity, UnitSystem units) {
    std::size_t i = 0;
    while (i < typed.size() && typed[i] == ' ') ++i;
    std::string digits;
    if (i < typed.size() && (typed[i] == '-' || typed[i] == '+')) {
        if (typed[i] == '-') digits += '-';
        ++i;
    }
    int count = 0, points = 0;
    for (; i < typed.size(); ++i) {
        const char c = typed[i];
        if (c >= '0' && c <= '9') {
            digits += c;
            ++count;
        } else if (c == '.' || c == ',') {
            digits += '.';
            ++points;
        } else {
            break;
        }
    }
    // Two points would be a thousands mark, and nobody can tell which: better not to guess.
    if (count == 0 || count > 40 || points > 1) return std::nullopt;
    if (i + 1 < typed.size() && (typed[i] == 'e' || typed[i] == 'E')) {
        std::size_t j = i + 1;
        std::string power = "e";
        if (typed[j] == '-' || typed[j] == '+') power += typed[j++];
        const std::size_t first = j;
        while (j < typed.size() && typed[j] >= '0' && typed[j] <= '9') power += typed[j++];
        if (j > first && j - first <= 3) {
            digits += power;
            i = j;
        }
    }
    std::istringstream in(digits);
    in.imbue(std::locale::classic());
    double number = 0.0;
    if (!(in >> number) || !std::isfinite(number)) return std::nullopt;

    const std::string unit = lower_trimmed(typed.substr(i));
    const auto result = [](double si) { return std::isfinite(si) ? std::optional<double>(si) : std::nullopt; };
    if (unit.empty()) {
        const TypedUnit own = typed_unit(quantity, units);
        return result(number * own.factor + own.offset);
    }
    for (const UnitSystem system : {units, UnitSystem::metric, UnitSystem::imperial}) {
        for (const Unit& u : units_of(quantity, system)) {
            if (*u.name && lower_trimmed(u.name) == unit) return result(number * u.factor + u.offset);
        }
    }
    for (const Spoken& s : spoken) {
        if (s.quantity == quantity && s.name == unit) return result(number * s.factor);
    }
    if (quantity == Quantity::temperature && unit == "f") {
        return result(number * temperature_imperial[0].factor + temperature_imperial[0].offset);
    }
    return std::nullopt;
}

std::string spell(std::string_view words, UnitSystem units) {
    static constexpr std::array<const char*, 19> names{
        "none",  "length",       "small_length", "time",     "frequency",   "speed",    "attenuation",
        "loss",  "conductivity", "permittivity", "fraction", "temperature", "salinity", "density",
        "angle", "count",        "rate",         "ratio",    "impedance"};
    std::string out;
    while (!words.empty()) {
        const std::size_t open = words.find('{');
        out += words.substr(0, open);
        if (open == std::string_view::npos) break;
        words.remove_prefix(open);
        const std::size_t close = words.find('}'), bar = words.find('|'), again = words.find('{', 1);
        if (close == std::string_view::npos || bar == std::string_view::npos || bar > close || again < close) {
            out += '{';
            words.remove_prefix(1);
            continue;
        }
        const auto value = read_number(words.substr(1, bar - 1), Quantity::none, UnitSystem::metric);
        const auto name = std::find(names.begin(), names.end(), words.substr(bar + 1, close - bar - 1));
        if (value && name != names.end()) {
            out += say(*value, static_cast<Quantity>(name - names.begin()), units);
        } else {
            out += words.substr(0, close + 1);
        }
        words.remove_prefix(close + 1);
    }
    return out;
}

}  // namespace gg

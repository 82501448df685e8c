#include "survey/words.hpp"

#include <array>
#include <cmath>
#include <cstdio>

namespace gg {
namespace {

constexpr std::array<double, 10> keyed{1.0, 1.5, 2.0, 2.5, 3.0, 4.0, 5.0, 6.0, 8.0, 10.0};
// A value that was keyed already must stay put although its quotient carries rounding errors.
constexpr double slack = 1e-9;

}  // namespace

std::string_view key_of(Quantity quantity) {
    switch (quantity) {
        case Quantity::none:
            return "none";
        case Quantity::length:
            return "length";
        case Quantity::small_length:
            return "small_length";
        case Quantity::time:
            return "time";
        case Quantity::frequency:
            return "frequency";
        case Quantity::speed:
            return "speed";
        case Quantity::attenuation:
            return "attenuation";
        case Quantity::loss:
            return "loss";
        case Quantity::conductivity:
            return "conductivity";
        case Quantity::permittivity:
            return "permittivity";
        case Quantity::fraction:
            return "fraction";
        case Quantity::temperature:
            return "temperature";
        case Quantity::salinity:
            return "salinity";
        case Quantity::density:
            return "density";
        case Quantity::angle:
            return "angle";
        case Quantity::count:
            return "count";
        case Quantity::rate:
            return "rate";
        case Quantity::ratio:
            return "ratio";
        case Quantity::impedance:
            return "impedance";
    }
    return "none";
}

std::string token(double si, Quantity quantity) {
    char digits[40];
    std::snprintf(digits, sizeof digits, quantity == Quantity::count ? "%.0f" : "%.4g", std::isfinite(si) ? si : 0.0);
    std::string written = "{";
    written += digits;
    written += '|';
    written += key_of(quantity);
    written += '}';
    return written;
}

double keyed_down(double x) {
    if (!(x > 0.0 && x < 1e30)) return 0.0;
    const double decade = std::pow(10.0, std::floor(std::log10(x)));
    double best = decade;
    for (double m : keyed) {
        if (m * decade <= x * (1.0 + slack)) best = m * decade;
    }
    return best;
}

double keyed_up(double x) {
    if (!(x > 0.0 && x < 1e30)) return 0.0;
    const double decade = std::pow(10.0, std::floor(std::log10(x)));
    for (double m : keyed) {
        if (m * decade >= x * (1.0 - slack)) return m * decade;
    }
    return 10.0 * decade;
}

}  // namespace gg

#pragma once
/// Errors are values: every computation below `app` gives a finite number, or a finite stand-in and the reason why not.
#include <cmath>
#include <cstdint>
#include <string_view>

namespace gg {

enum class Issue : std::uint8_t {
    none,          ///< the value stands
    not_a_number,  ///< an input was NaN or infinite
    out_of_range,  ///< an input was outside its legal range
    outside_band,  ///< computed, but outside the range the model was published for: an extrapolation
    model_fails,   ///< the model has no physical answer there; a clamped stand-in is given
    no_solution    ///< the search found nothing: the thing asked for does not exist in the range searched
};

/// One sentence, in plain words, for an issue; empty for Issue::none.
std::string_view sentence(Issue issue);
/// The graver of two issues: what a result built on both has to say.
Issue worse(Issue a, Issue b);

/// A number that is always finite. When `issue` is not none or outside_band, `value` is a stand-in (usually 0).
struct Value {
    double value = 0.0;
    Issue issue = Issue::none;

    /// True when the number may be shown (an extrapolation may, with its flag).
    bool ok() const { return issue == Issue::none || issue == Issue::outside_band; }
    bool operator==(const Value&) const = default;
};

/// `x` as a Value, or Issue::not_a_number with 0 where it is not finite.
inline Value finite(double x, Issue issue = Issue::none) {
    return std::isfinite(x) ? Value{x, issue} : Value{0.0, Issue::not_a_number};
}
inline Value finite(Value v) { return finite(v.value, v.issue); }

/// An input that is not known exactly: low <= likely <= high, same unit.
struct Range {
    double low = 0.0, likely = 0.0, high = 0.0;
    bool operator==(const Range&) const = default;
};

/// A range of zero width.
constexpr Range exactly(double x) { return {x, x, x}; }

}  // namespace gg

#include "survey/sideways.hpp"

#include <algorithm>
#include <cmath>

#include "survey/downwards.hpp"
#include "survey/parts.hpp"
#include "survey/words.hpp"

namespace gg {
namespace {

constexpr int curve_points = 20;  // cubic between them: 1e-4 of the delay

// Where a peak of two neighbours' response is looked for: from the middle to beyond the target at half the gap.
constexpr int peak_places = 16;
double place_of(int i, double gap) { return 0.8 * gap * i / peak_places; }

double dip_under(double peak, double middle) { return peak > 0.0 ? std::clamp(1.0 - middle / peak, 0.0, 1.0) : 0.0; }

}  // namespace

double echo_time(const Case& c, double x, double radius) {
    const double h = 0.5 * c.separation;
    if (!(radius > 0.0)) return leg_to(c.path, x - h).time + leg_to(c.path, x + h).time;
    const double axis = c.depth + radius;
    double side = 0.0, up = 0.0, time = 0.0;  // point on the rim from the axis
    Path path = c.path_to(axis);
    Leg down, back;
    for (int turn = 0; turn < 2; ++turn) {
        const double a = x - h - side, b = x + h - side;
        down = leg_to(path, a, down.tangent), back = leg_to(path, b, back.tangent);
        time = down.time + back.time;
        if (turn == 1) break;
        // The rim's normal halves the angle between the legs.
        const double angle = 0.5 * (std::copysign(down.angle, a) + std::copysign(back.angle, b));
        side = radius * std::sin(angle);
        up = radius * std::cos(angle);
        path = c.path_to(axis - up);
    }
    return time;
}

EchoCurve::EchoCurve(const Case& c, double radius, double reach)
    : apex(echo_time(c, 0.0, radius)), later_(curve_points + 1), step_(reach / curve_points) {
    for (int i = 1; i <= curve_points; ++i) later_[i] = echo_time(c, i * step_, radius) - apex;
}

double EchoCurve::later(double x) const {
    const double place = std::abs(x) / step_;
    const int last = curve_points;
    if (!(place < last - 1)) {
        const double slope = later_[last] - later_[last - 1];
        return later_[last] + (place - last) * slope;
    }
    const int i = static_cast<int>(place);
    const double u = place - i;
    // Cubic through four neighbours; the curve is even about 0.
    const double y0 = i == 0 ? later_[1] : later_[i - 1], y1 = later_[i], y2 = later_[i + 1], y3 = later_[i + 2];
    return -u * (u - 1.0) * (u - 2.0) / 6.0 * y0 + (u + 1.0) * (u - 1.0) * (u - 2.0) / 2.0 * y1 -
           (u + 1.0) * u * (u - 2.0) / 2.0 * y2 + (u + 1.0) * u * (u - 1.0) / 6.0 * y3;
}

double pair_response(const EchoPulse& echo, const EchoCurve& curve, double gap, double x) {
    return std::sqrt(std::norm(echo.at(-curve.later(x + 0.5 * gap)) + echo.at(-curve.later(x - 0.5 * gap))));
}

double pair_dip(const EchoPulse& echo, const EchoCurve& curve, double gap) {
    const double middle = pair_response(echo, curve, gap, 0.0);
    double peak = middle;
    for (int i = 1; i <= peak_places; ++i) peak = std::max(peak, pair_response(echo, curve, gap, place_of(i, gap)));
    return dip_under(peak, middle);
}

bool pair_parts(const EchoPulse& echo, const EchoCurve& curve, double gap) {
    const double middle = pair_response(echo, curve, gap, 0.0);
    // From over the target outwards, then from there inwards: the peak mostly stands there.
    constexpr int over_target = 10;
    for (int k = 0; k < peak_places; ++k) {
        const int i = over_target + k <= peak_places ? over_target + k : peak_places - k;
        if (dip_under(pair_response(echo, curve, gap, place_of(i, gap)), middle) >= apart_dip) return true;
    }
    return false;
}

Value smallest_gap(const Case& c, double radius) {
    const EchoPulse& echo = c.echo;
    const double apex = echo_time(c, 0.0, radius);
    const double start = std::sqrt(2.0 * (c.depth + radius) * c.wave().speed * echo.width);
    // A gap at which the middle lies in neither echo any more: safely apart.
    const double half =
        offset_where([&](double x) { return echo_time(c, x, radius) - apex; }, 0.9 * echo.width, 0.5 * start);
    double far = 2.0 * half;
    const EchoCurve curve(c, radius, 1.5 * far);
    if (!(pair_parts(echo, curve, far))) return {far, Issue::no_solution};
    // Down from there to the first gap that fails, so that a dip by chance at a small gap does not count.
    double near = far;
    for (int i = 0; i < 80; ++i) {
        near = 0.95 * far;
        if (!(pair_parts(echo, curve, near))) break;
        far = near;
    }
    for (int i = 0; i < 7; ++i) {
        const double mid = 0.5 * (near + far);
        (pair_parts(echo, curve, mid) ? far : near) = mid;
    }
    return finite(std::max(far, 2.0 * radius));
}

double lateral_rule(double speed, double range, double width) {
    if (!(speed > 0.0 && range > 0.0 && width > 0.0)) return 0.0;
    return std::sqrt(0.5 * speed * range * width);
}

void grade_sideways(Answer& a, const Plan& plan, std::optional<Value> focused) {
    const double asked = plan.need.closest;
    const double goal = asked > 0.0 ? asked : plan.target.count > 1 ? plan.target.gap : 0.0;
    std::string least = token(a.likely.value, Quantity::length) + " centre to centre";
    if (!a.likely.ok()) least = "no distance at all";
    if (focused && focused->ok()) least += " (focused: " + token(focused->value, Quantity::length) + ")";
    a.grade = Grade::none;
    a.mends.clear();
    if (!(goal > 0.0)) {
        a.why = "Two such targets side by side would show as two from " + least + ".";
        return;
    }
    const bool after_focusing = focused && focused->ok() && focused->value <= goal;
    a.grade = a.likely.ok() && a.high <= goal                               ? Grade::good
              : (a.likely.ok() && a.likely.value <= goal) || after_focusing ? Grade::thin
                                                                            : Grade::poor;
    a.why = "Two of them show as two from " + least + "; " + (asked > 0.0 ? "asked for are " : "these lie ") +
            token(goal, Quantity::length) +
            (asked > 0.0              ? "."
             : a.grade == Grade::poor ? " apart, so they run together."
                                      : " apart.");
    if (a.grade != Grade::good && a.likely.ok()) {
        // The gap goes with the root of the pulse width at depth.
        const double want = keyed_up(plan.antenna.pulse.centre_frequency * std::pow(a.high / goal, 2.0));
        a.mends.push_back({"Centre frequency " + token(want, Quantity::frequency), "antenna.frequency", want});
    }
}

void add_sideways(const Setting& setting, Answers& answers) {
    const Case& c = setting.likely();
    const double f = setting.frequency(), R = setting.radius(), gap = setting.plan.target.gap;
    Answer& a = add(answers, Group::sideways, "apart.sideways", "Told apart sideways", Quantity::length,
                    spread_over(setting.cases, [&](const Case& k) { return smallest_gap(k, R); }));
    PairPicture& pair = answers.pair;
    const double half = 0.5 * gap + std::max(0.75 * gap, a.likely.value);
    const EchoCurve curve(c, R, half + 0.5 * gap);
    pair.first = -0.5 * gap;
    pair.dip = pair_dip(c.echo, curve, gap);
    constexpr int n = 96;
    // The grid may step over a lone peak: the response over a target counts too.
    double peak = pair_response(c.echo, curve, gap, 0.5 * gap);
    for (int i = 0; i <= n; ++i) {
        const double x = half * (2.0 * i / n - 1.0);
        const double left = curve.later(x + 0.5 * gap), right = curve.later(x - 0.5 * gap);
        pair.positions.push_back(x);
        pair.arrival_left.push_back(curve.apex + left);
        pair.arrival_right.push_back(curve.apex + right);
        pair.alone_left.push_back(c.echo.envelope(-left));
        pair.alone_right.push_back(c.echo.envelope(-right));
        pair.response.push_back(pair_response(c.echo, curve, gap, x));
        peak = std::max(peak, pair.response.back());
    }
    for (auto* row : {&pair.response, &pair.alone_left, &pair.alone_right}) {
        for (double& y : *row) y = peak > 0.0 ? y / peak : 0.0;
    }
    using Verdict = PairPicture::Verdict;
    const bool touching = gap < 2.0 * R;
    if (pair.dip >= apart_dip && !touching) {
        pair.verdict = Verdict::apart;
    } else {
        // A dip too shallow to count, or the widened hump of two: from two thirds of the smallest gap it is seen as
        // long.
        pair.verdict = pair.dip > 0.02 || gap > a.likely.value * 2.0 / 3.0 ? Verdict::merging : Verdict::one;
    }

    const double v = c.wave().speed;
    a.formula =
        "Two equal targets at the target's depth; returned pulses laid over each other with the refracted travel "
        "times; "
        "smallest distance with a dip of 19 percent in the envelope between them (Rayleigh's dip).";
    a.rules = {{"half the wavelength", 0.5 * v / f, "common practice, no source"},
               {"sqrt(speed x depth x pulse width / 2)", lateral_rule(c.mean_speed(), c.depth, 1.0 / f),
                "Annan & Cosway 1992, from memory"}};
    grade_sideways(a, setting.plan);
}

}  // namespace gg

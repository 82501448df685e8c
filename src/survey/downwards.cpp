#include "survey/downwards.hpp"

#include <algorithm>
#include <cmath>

#include "survey/parts.hpp"
#include "survey/words.hpp"

namespace gg {
namespace {

double upright(const EchoPulse& e, double t, bool rings) { return rings ? e.envelope(t) : e.upright(t); }

bool rings(const EchoPulse& e) {
    double side = 0.0;
    bool fell = false;
    for (double t = 0.0; t < 3.0 * e.width; t += e.width / 16.0) {
        const double now = e.upright(t);
        fell = fell || now < 0.0;
        if (fell) side = std::max(side, now);
    }
    return side > 0.5;
}

double dip_of(const EchoPulse& e, double delay, bool ringing) {
    if (!(delay > 0.0)) return 0.0;
    constexpr int n = 24;
    const double pad = 0.25 * std::min(delay, e.width);
    const auto sum = [&](double t) {
        if (ringing) return std::max(upright(e, t, true), upright(e, t - delay, true));
        return upright(e, t, false) + upright(e, t - delay, false);
    };
    double values[n + 1];
    int lowest = -1;
    for (int i = 0; i <= n; ++i) {
        const double t = -pad + (delay + 2.0 * pad) * i / n;
        values[i] = sum(t);
        if (t >= 0.0 && t <= delay && (lowest < 0 || values[i] < values[lowest])) lowest = i;
    }
    const double left = *std::max_element(values, values + lowest + 1),
                 right = *std::max_element(values + lowest, values + n + 1);
    const double crest = std::min(left, right);
    if (!(crest > 0.0)) return 0.0;
    return std::clamp(1.0 - std::max(values[lowest], 0.0) / crest, 0.0, 1.0);
}

}  // namespace

double dip_between(const EchoPulse& echo, double delay) { return dip_of(echo, delay, rings(echo)); }

Value smallest_delay(const EchoPulse& echo, double dip) {
    const bool ringing = rings(echo);
    // A dip of exactly nothing has no edge to search for; the flat spot is the last delay without one.
    const double goal = std::max(dip, 1e-4);
    const double step = 0.1 * echo.width;
    double far = step;
    while (far < 4.0 * echo.width && !(dip_of(echo, far, ringing) >= goal)) far += step;
    if (!(far < 4.0 * echo.width)) return {0.0, Issue::no_solution};
    double near = far - step;
    for (int i = 0; i < 10; ++i) {
        const double mid = 0.5 * (near + far);
        (dip_of(echo, mid, ringing) >= goal ? far : near) = mid;
    }
    return finite(0.5 * (near + far));
}

void add_downwards(const Setting& setting, Answers& answers) {
    const Case& c = setting.likely();
    const double f = setting.frequency();
    Answer& a = add(answers, Group::downwards, "apart.down", "Told apart downwards", Quantity::length,
                    spread_over(setting.cases, [](const Case& k) {
                        const Value delay = smallest_delay(k.echo, apart_dip);
                        return Value{0.5 * k.wave().speed * delay.value, delay.issue};
                    }));
    a.why = "Two thin layers one above the other show as two when they are " + token(a.likely.value, Quantity::length) +
            " apart or more; closer, they look like one.";
    a.formula =
        "Half the speed at the target times the smallest delay at which two equal returned pulses leave a dip of 19 "
        "percent between their crests (Rayleigh's dip).";
    if (!a.likely.ok()) {
        a.why = "The returned pulse rings so long that two layers never show as two.";
    }
    const double v = c.wave().speed;
    a.rules = {{"a quarter of the wavelength", 0.25 * v / f, "Annan & Cosway 1992; geoscixyz GPG, GPR survey data"},
               {"pulse width x speed / 2", 0.5 * v * c.echo.width, "geometry, with the returned pulse's width"}};
    const double asked = setting.plan.need.depth_accuracy;
    if (asked > 0.0) {
        a.grade = a.high <= asked ? Grade::good : a.likely.value <= asked ? Grade::thin : Grade::poor;
        if (a.grade != Grade::good) {
            const double want = keyed_up(f * a.likely.value / asked);
            a.mends.push_back({"Centre frequency " + token(want, Quantity::frequency), "antenna.frequency", want});
        }
    }
}

}  // namespace gg

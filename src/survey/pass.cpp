#include <algorithm>
#include <cmath>

#include "survey/parts.hpp"
#include "survey/rebuild.hpp"
#include "survey/words.hpp"

namespace gg {
namespace {

/// Slowest speed on the way down, m/s: the shortest wave that a trace can meet.
double slowest(const Case& c) {
    double v = c.ground->waves[0].speed;
    for (int i = 1; i <= c.layer; ++i) v = std::min(v, c.ground->waves[i].speed);
    return v;
}

/// Depth that a whole echo must fit in.
double deepest(const Setting& setting, const Case& c) { return std::max(c.depth, setting.plan.need.deepest); }

double arrival_at(const Case& c, double depth) { return 2.0 * leg_to(c.path_to(depth), 0.5 * c.separation).time; }

/// Depth whose echo arrives at `time`; 0 where even the surface's is later.
double reach_in(const Case& c, double time) {
    double left = 0.5 * time - c.height / speed_of_light, z = 0.0;
    const auto& slabs = c.ground->stack.slabs;
    for (std::size_t i = 0; i < slabs.size() && left > 0.0; ++i) {
        const double v = c.ground->waves[i].speed;
        const bool last = i + 1 == slabs.size();
        const double t = last ? left : std::min(left, slabs[i].thickness / v);
        z += t * v;
        left -= t;
    }
    return z;
}

void step_answers(const Setting& setting, const Patch& patch, Answers& answers) {
    const Case& c = setting.likely();
    const double f = setting.frequency(), chosen = setting.plan.pass.step;
    Answer& step =
        add(answers, Group::pass, "pass.step", "Largest step", Quantity::small_length,
            spread_over(setting.cases, [&](const Case& k) { return 0.25 * slowest(k) / setting.band.high; }));
    const double rule = 0.25 * slowest(c) / f;
    step.grade = chosen <= step.likely.value ? Grade::good : chosen <= rule ? Grade::thin : Grade::poor;
    step.why = std::string("A trace every ") + token(chosen, Quantity::small_length) +
               (step.grade == Grade::good ? " catches even the flanks of an echo; the step could be " +
                                                token(step.likely.value, Quantity::small_length) + "."
                : step.grade == Grade::thin ? " is near the limit: the finest part of the pulse asks for " +
                                                  token(step.likely.value, Quantity::small_length) + "."
                                            : " is too coarse: the flanks of an echo fold over, " +
                                                  token(step.likely.value, Quantity::small_length) + " is needed.");
    step.formula =
        "Quarter of the shortest wavelength: speed / (4 x upper -10 dB edge of the sent band). Going down and back "
        "doubles the phase, and an echo from far aside turns it by half a wave a step at that distance (Nyquist).";
    step.rules = {{"c / (4 f sqrt(K)), at the centre frequency", rule, "Annan & Cosway 1992, from memory"}};
    if (step.grade != Grade::good) {
        const double want = keyed_down(step.likely.value);
        step.mends.push_back({"Step " + token(want, Quantity::small_length), "pass.step", want});
    }

    Answer& hits = add(answers, Group::pass, "pass.hits", "Traces across the lit patch", Quantity::count,
                       spread_over(setting.cases, [&](const Case& k) {
                           // The patch goes with the root of wavelength times depth; close enough for a count's range.
                           const double scale =
                               std::sqrt(k.wave().wavelength * k.depth / (c.wave().wavelength * c.depth));
                           return std::floor(2.0 * patch.along * scale / chosen);
                       }));
    const double n = hits.likely.value;
    hits.grade = n >= 8.0 ? Grade::good : n >= 3.0 ? Grade::thin : Grade::poor;
    hits.why = n < 1.0 ? "The step is longer than the patch a trace sees: the target can lie between two traces."
                       : token(n, Quantity::count) + (n < 2.0 ? " trace falls" : " traces fall") +
                             " on the patch that the target answers from.";
    hits.formula = "Lit patch along the line over the step, whole traces.";
    hits.rules = {{"at least three traces to call it an echo", 3.0, "common practice, no source"}};
    if (hits.grade != Grade::good) {
        const double want = keyed_down(2.0 * patch.along / 8.0);
        hits.mends.push_back({"Step " + token(want, Quantity::small_length), "pass.step", want});
    }
}

void window_answers(const Setting& setting, Answers& answers) {
    const Case& c = setting.likely();
    const double chosen = setting.plan.pass.window;
    Answer& window = add(
        answers, Group::pass, "pass.window", "Time window needed", Quantity::time,
        spread_over(setting.cases, [&](const Case& k) { return arrival_at(k, deepest(setting, k)) + k.echo.tail; }));
    window.grade = chosen >= window.high ? Grade::good : chosen >= window.likely.value ? Grade::thin : Grade::poor;
    const double rule = 1.3 * 2.0 * deepest(setting, c) / c.mean_speed();
    const std::string said = token(chosen, Quantity::time), need = token(window.likely.value, Quantity::time);
    if (chosen <= c.echo.width) {
        window.why = "A window of " + said + " is shorter than the pulse itself: no whole echo fits in it; " + need +
                     " are needed.";
    } else if (window.grade == Grade::poor) {
        window.why = "The window of " + said + " ends before the echo is in: " + need + " are needed.";
    } else if (window.grade == Grade::thin) {
        window.why = "The window of " + said + " holds the echo as the ground likely is; in the slowest ground " +
                     token(window.high, Quantity::time) + " are needed.";
    } else {
        window.why = "The window of " + said + " holds the whole echo even in the slowest ground.";
    }
    window.formula =
        "Two-way time to the target, or to the greatest depth asked for, and the returned pulse's tail down to 5 "
        "percent.";
    window.rules = {{"1.3 x 2 depth / speed", rule, "Annan & Cosway 1992, from memory"}};
    if (window.grade != Grade::good) {
        const double want = keyed_up(window.high);
        window.mends.push_back({"Window " + token(want, Quantity::time), "pass.window", want});
    }

    Answer& reach = add(answers, Group::pass, "pass.reach", "Depth the window reaches", Quantity::length,
                        spread_over(setting.cases, [&](const Case& k) { return reach_in(k, chosen - k.echo.tail); }));
    const double goal = deepest(setting, c);
    reach.grade = reach.low >= goal ? Grade::good : reach.likely.value >= goal ? Grade::thin : Grade::poor;
    if (reach.likely.value > 0.0) {
        reach.why = "A whole echo fits into the window down to " + token(reach.likely.value, Quantity::length) + ".";
    } else {
        reach.why = "The window is over before even the surface's pulse has passed: it reaches no depth at all.";
        reach.likely.issue = Issue::no_solution;
    }
    reach.formula = "Depth whose echo, tail and all, is in before the window's end.";
    reach.rules = {{"speed x window / (2 x 1.3)", c.mean_speed() * chosen / 2.6, "Annan & Cosway 1992, from memory"}};
    answers.pulse.window_depth = reach_in(c, chosen);
}

void sample_answers(const Setting& setting, Answers& answers) {
    const Case& c = setting.likely();
    const double f = setting.frequency(), window = setting.plan.pass.window;
    const int samples = setting.plan.pass.samples;
    const double chosen = window / samples, nyquist = 0.5 / setting.band.high, six = 1.0 / (6.0 * f);
    const int least = samples_for(window, nyquist), advised = samples_for(window, six);
    const auto mend = [&](Answer& a) {
        if (a.grade == Grade::good) return;
        double want = 64.0;
        while (want < advised) want *= 2.0;
        a.mends.push_back({token(want, Quantity::count) + " samples", "pass.samples", want});
    };
    const Grade grade = chosen <= six * (1.0 + 1e-9) ? Grade::good : chosen <= nyquist ? Grade::thin : Grade::poor;

    Answer& interval = add(answers, Group::pass, "pass.interval", "Sampling interval", Quantity::time, just(nyquist));
    interval.grade = grade;
    interval.why =
        grade == Grade::poor
            ? "One sample every " + token(chosen, Quantity::time) +
                  " is too few: the fine part of the pulse folds over and comes back as something that is not there."
            : "One sample every " + token(chosen, Quantity::time) +
                  (grade == Grade::good ? " is fine enough." : " just holds the pulse, with nothing to spare.");
    interval.formula = "Two samples in the shortest period of the sent pulse, at its upper -10 dB edge (Nyquist).";
    interval.rules = {{"1 / (6 f)", six, "Annan & Cosway 1992, from memory"}};
    mend(interval);

    Answer& count = add(answers, Group::pass, "pass.samples", "Samples needed", Quantity::count, just(least));
    count.grade = grade;
    count.why = "This window needs " + token(least, Quantity::count) + " samples at the very least and " +
                token(advised, Quantity::count) + " to be at ease; set are " + token(samples, Quantity::count) + ".";
    count.formula = "Window over the largest sampling interval, rounded up.";
    count.rules = {{"window x 6 f", static_cast<double>(advised), "Annan & Cosway 1992, from memory"}};
    mend(count);

    Answer& cycle = add(answers, Group::pass, "pass.per_cycle", "Samples in the shortest period", Quantity::ratio,
                        just(1.0 / (setting.band.high * chosen)));
    cycle.grade = grade;
    cycle.why = "The shortest period in the pulse gets " + token(cycle.likely.value, Quantity::ratio) +
                " samples; below two it folds over.";
    cycle.formula = "1 / (upper -10 dB edge x interval).";
    cycle.rules = {{"six a period of the centre frequency, counted at the upper edge", 6.0 * f / setting.band.high,
                    "Annan & Cosway 1992, from memory"},
                   {"two, Nyquist", 2.0, "Nyquist"}};
    mend(cycle);

    const RebuildError likely = rebuild_error(c.echo, chosen);
    // The finer the returned pulse, the more it asks: its ends over the unknown are those of its frequency.
    const Case *low = &c, *high = &c;
    for (const Case& k : setting.cases.all) {
        if (k.echo.frequency < low->echo.frequency) low = &k;
        if (k.echo.frequency > high->echo.frequency) high = &k;
    }
    Spread spread = just(likely.band_limited);
    for (const Case* k : {low, high}) {
        if (k == &c) continue;
        const double e = rebuild_error(k->echo, chosen).band_limited;
        spread.low = std::min(spread.low, e);
        spread.high = std::max(spread.high, e);
    }
    Answer& error = add(answers, Group::pass, "pass.error", "Rebuilding error", Quantity::fraction, spread);
    error.grade = error.high <= 0.02 ? Grade::good : error.likely.value <= 0.1 ? Grade::thin : Grade::poor;
    error.why = "Rebuilt from its samples the echo is at worst " + token(likely.band_limited, Quantity::fraction) +
                " off; its dots joined by straight lines are " + token(likely.joined, Quantity::fraction) + " off.";
    error.formula =
        "Returned pulse sampled at the chosen interval, at its worst phase, rebuilt by sinc functions, against the "
        "true one; share of its peak.";
    error.rules = {{"dots joined by straight lines", likely.joined, "computed in the same way"}};
    mend(error);
}

}  // namespace

void add_pass(const Setting& setting, const Patch& patch, Answers& answers) {
    step_answers(setting, patch, answers);
    window_answers(setting, answers);
    sample_answers(setting, answers);
}

}  // namespace gg

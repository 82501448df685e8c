#include <algorithm>
#include <cmath>

#include "survey/lines.hpp"
#include "survey/parts.hpp"
#include "survey/words.hpp"

namespace gg {

void add_lanes(const Setting& setting, const Patch& patch, Answers& answers) {
    const Plan& plan = setting.plan;
    LanesPicture& picture = answers.lanes;
    const double bridge = 2.0 * patch.across;
    const Walk walk = walk_of(plan);
    picture.lines = walk.lines;
    picture.distance = walk.distance;
    const Crossings crossings = crossings_of(plan, walk);
    picture.target_from = crossings.from;
    picture.target_to = crossings.to;
    picture.hits = crossings.hits;
    picture.gaps = gaps_of(crossings, bridge);

    const double between = distance_between_hits(plan);
    const double spacing = plan.lanes.spacing;
    const bool none = !(between > 0.0);
    const std::string said = token(spacing, Quantity::length);
    const bool wide = plan.lanes.outline.size() > 2 && walk.lines.size() <= 1 && spacing > walk.width;
    const Grade grade = none || between > bridge ? Grade::poor : between > 0.5 * bridge ? Grade::thin : Grade::good;
    const auto mend = [&](Answer& a) {
        if (a.grade == Grade::good || a.grade == Grade::none) return;
        if (none) {
            const double across = std::fmod(plan.target.bearing + 0.5 * pi, pi);
            a.mends.push_back(
                {"Walk at right angles to the target", "lanes.bearing", across < 0.0 ? across + pi : across});
            return;
        }
        const double want = keyed_down(std::max(0.05, 0.5 * bridge * spacing / between));
        if (want < spacing) a.mends.push_back({"Line spacing " + token(want, Quantity::length), "lanes.spacing", want});
    };

    Answer& gap =
        add(answers, Group::lanes, "lanes.between_hits", "Distance between hits", Quantity::length, just(between));
    gap.grade = grade;
    if (none) {
        gap.likely.issue = Issue::no_solution;
        gap.why = "The lines run along the target, so none crosses it: walk across it, or both ways.";
    } else {
        gap.why = "Along the target it is hit every " + token(between, Quantity::length) + " at most.";
    }
    gap.formula = "Widest gap between neighbouring tracks over the sine of the angle at which they cross the target.";
    gap.rules = {{"the line spacing, for a crossing at right angles", spacing, "geometry"}};
    mend(gap);

    Answer& hits = add(answers, Group::lanes, "lanes.hits", "Hits on the target", Quantity::count,
                       just(static_cast<double>(picture.hits.size())));
    const std::size_t n = picture.hits.size();
    hits.grade = n >= 5 ? Grade::good : n >= 3 ? Grade::thin : Grade::poor;
    if (area_of(plan.lanes.outline) <= 0.0) {
        hits.why = "The site's outline encloses no ground: there is nothing to walk.";
        hits.likely.issue = Issue::no_solution;
    } else if (wide) {
        hits.why = "The lines stand " + said + " apart, wider than the site: " +
                   (walk.lines.empty() ? "no line fits." : "one line is all there is.");
    } else {
        hits.why = token(static_cast<double>(n), Quantity::count) + (n == 1 ? " line crosses" : " lines cross") +
                   " the target on this site" + (n < 3 ? ": too few to call it a line." : ".");
    }
    hits.formula = "Tracks of every channel, cut to the site, crossed with the target through the middle of the site.";
    hits.rules = {{"at least three hits to call it a line", 3.0, "common practice, no source"}};
    mend(hits);

    Answer& whole = add(answers, Group::lanes, "lanes.picture", "Gap a picture bridges", Quantity::length,
                        spread_over(setting.cases, [&](const Case& k) {
                            const Case& c = setting.likely();
                            return bridge * std::sqrt(k.wave().wavelength * k.depth / (c.wave().wavelength * c.depth));
                        }));
    whole.grade = grade;
    const std::string most = token(bridge, Quantity::length);
    whole.why = none                   ? "There are no hits to draw a picture from."
                : grade == Grade::poor ? "The hits lie farther apart than the " + most +
                                             " a line lights: drawn between them, the target breaks up into beads."
                : grade == Grade::thin
                    ? "The hits lie within the " + most + " a line lights, but a picture drawn between them is soft."
                    : "The hits overlap well within the " + most + " a line lights: the target is drawn unbroken.";
    whole.formula =
        "Width of the lit patch across the line; a picture blurred by it needs two looks in that width (Nyquist) to "
        "stand, and breaks up when there is less than one.";
    whole.rules = {{"a quarter of the wavelength, for a full picture", 0.25 * setting.likely().wave().wavelength,
                    "Grasmueck, Weger & Horstmeyer 2005, from memory"}};
    mend(whole);

    const double swath = (plan.antenna.channels - 1) * plan.antenna.channel_spacing + bridge;
    Answer& strip = add(answers, Group::lanes, "lanes.swath", "Width one pass lights", Quantity::length, just(swath));
    strip.grade = swath >= spacing ? Grade::good : swath >= 0.5 * spacing ? Grade::thin : Grade::poor;
    strip.why = "One pass lights a strip " + token(swath, Quantity::length) + " wide, and the passes lie " + said +
                " apart" +
                (swath >= spacing ? "." : ": " + token(spacing - swath, Quantity::length) + " between them stay dark.");
    strip.formula = "Channels' spread and the lit patch across the line at the target's depth.";
    if (plan.antenna.channels > 1) {
        strip.rules = {{"channels x channel spacing", plan.antenna.channels * plan.antenna.channel_spacing,
                        "common practice, no source"}};
    }
    if (strip.grade != Grade::good) {
        const double want = keyed_down(swath);
        strip.mends.push_back({"Line spacing " + token(want, Quantity::length), "lanes.spacing", want});
    }
}

}  // namespace gg

#include "survey/patch.hpp"

#include <cmath>

#include "survey/parts.hpp"
#include "survey/words.hpp"

namespace gg {

Patch lit_patch(const Path& path, double separation, double frequency) {
    const double h = 0.5 * separation;
    const double straight = 2.0 * leg_to(path, h).time;
    const double goal = 0.5 / frequency;
    const double depth = path.depth();
    const double lambda = depth / path.time_down() / frequency;
    const double guess = std::sqrt(0.5 * lambda * depth + lambda * lambda / 16.0);
    const auto along = [&](double x) { return leg_to(path, x - h).time + leg_to(path, x + h).time - straight; };
    const auto across = [&](double y) { return 2.0 * leg_to(path, std::sqrt(h * h + y * y)).time - straight; };
    return {offset_where(along, goal, guess), offset_where(across, goal, guess)};
}

double fresnel_rule(double depth, double wavelength) {
    if (!(depth > 0.0 && wavelength > 0.0)) return 0.0;
    return std::sqrt(0.5 * wavelength * depth + wavelength * wavelength / 16.0);
}

double footprint_rule(double depth, double wavelength, double permittivity) {
    if (!(depth > 0.0 && wavelength > 0.0 && permittivity >= 1.0)) return 0.0;
    return 0.25 * wavelength + depth / std::sqrt(permittivity + 1.0);
}

Patch add_patch(const Setting& setting, Answers& answers) {
    const double f = setting.frequency();
    std::vector<Patch> all;
    for (const Case& c : setting.cases.all) all.push_back(lit_patch(c.path, c.separation, f));
    const auto of = [&](const Case& c) -> const Patch& { return all[&c - setting.cases.all.data()]; };

    const Case& c = setting.likely();
    const double v = c.mean_speed(), lambda = v / f, K = std::max(1.0, std::pow(speed_of_light / v, 2));
    const double fresnel = 2.0 * fresnel_rule(c.depth, lambda), A = footprint_rule(c.depth, lambda, K);
    const std::string source =
        "Annan & Cosway 1992, from memory; printed with K + 1, while the critical-angle cone gives K - 1";
    const std::string how =
        "First Fresnel zone through the refracting layers: where the path down and back is half a period longer than "
        "the "
        "shortest, transmitter and receiver apart. ";

    Answer& along = add(answers, Group::patch, "patch.along", "Lit patch along the line", Quantity::length,
                        spread_over(setting.cases, [&](const Case& k) { return 2.0 * of(k).along; }));
    along.why = "At the target's depth one trace sees a patch " + token(along.likely.value, Quantity::length) +
                " long, not a point.";
    along.formula = how +
                    "Along the line the antenna's separation lengthens it; with the electric field across the line, as "
                    "is usual, this is the magnetic plane and the published rule's long radius.";
    along.rules = {{"Fresnel zone by straight rays, 2 sqrt(wavelength depth/2 + wavelength^2/16)", fresnel, "geometry"},
                   {"footprint, 2 (wavelength/4 + depth/sqrt(K+1))", 2.0 * A, source}};

    Answer& across = add(answers, Group::patch, "patch.across", "Lit patch across the line", Quantity::length,
                         spread_over(setting.cases, [&](const Case& k) { return 2.0 * of(k).across; }));
    across.why = "Across the line the patch is " + token(across.likely.value, Quantity::length) +
                 " wide; what lies farther aside is for the next line.";
    across.formula = how +
                     "Across the line is the electric plane when the field lies across the line, and the published "
                     "rule's short radius, half the long one.";
    across.rules = {
        {"Fresnel zone by straight rays, 2 sqrt(wavelength depth/2 + wavelength^2/16)", fresnel, "geometry"},
        {"footprint's short width, wavelength/4 + depth/sqrt(K+1)", A, source}};

    // Graded only against what is to be kept apart: a patch is no fault by itself.
    if (setting.plan.need.closest > 0.0) {
        for (const char* key : {"patch.along", "patch.across"}) {
            for (Answer& a : answers.list) {
                if (a.key != key) continue;
                const double ratio = a.likely.value / setting.plan.need.closest;
                a.grade = ratio <= 1.0 ? Grade::good : ratio <= 2.0 ? Grade::thin : Grade::poor;
            }
        }
    }
    return of(c);
}

}  // namespace gg

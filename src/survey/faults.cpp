// What makes no sense in a plan, and what would.
#include <cmath>

#include "survey/fields.hpp"
#include "survey/words.hpp"

namespace gg {

namespace {

constexpr std::size_t most_corners = 200;

double turn(SitePoint a, SitePoint b, SitePoint c) { return (b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x); }

/// Whether the segments ab and cd cross or touch at more than a shared corner's worth.
bool cross(SitePoint a, SitePoint b, SitePoint c, SitePoint d) {
    return turn(a, b, c) * turn(a, b, d) < 0 && turn(c, d, a) * turn(c, d, b) < 0;
}

std::string outline_fault(const std::vector<SitePoint>& outline) {
    const std::size_t n = outline.size();
    if (n < 3) return "The site's outline needs at least three corners.";
    if (n > most_corners) return "The site's outline may have at most " + std::to_string(most_corners) + " corners.";
    double area = 0.0;
    for (std::size_t i = 0; i < n; ++i) {
        const SitePoint a = outline[i], b = outline[(i + 1) % n];
        if (!(std::abs(a.x) <= 1e7 && std::abs(a.y) <= 1e7))
            return "Corner " + std::to_string(i + 1) + " of the site's outline is not a place.";
        area += 0.5 * (a.x * b.y - b.x * a.y);
        for (std::size_t j = i + 2; j < n; ++j)
            if (cross(a, b, outline[j], outline[(j + 1) % n]))
                return "The site's outline crosses itself: give its corners in walking order.";
    }
    if (!(std::abs(area) > 1e-4)) return "The site's outline encloses no ground.";
    return {};
}

void matter_faults(const Matter& matter, const std::string& where, std::vector<std::string>& faults) {
    const CatalogueRow* row = find_material(matter.material);
    if (!row && matter.material != "own") {
        faults.push_back("The material of " + where + ", \"" + matter.material +
                         "\", is not in the catalogue; \"own\" takes numbers of your own.");
        return;
    }
    const Model model = row ? row->material.model : Model::constant;
    if (model == Model::metal)
        faults.push_back("The material of " + where + " cannot be metal: nothing gets through it.");
    if (takes(model, Input::sand) && takes(model, Input::clay) &&
        matter.inputs[Input::sand].likely + matter.inputs[Input::clay].likely > 1 + 1e-9)
        faults.push_back("Sand and clay of " + where +
                         " are together more than all of it: keep them to 100 % at most.");
}

}  // namespace

std::vector<std::string> faults_of(const Plan& plan) {
    std::vector<std::string> faults;
    if (plan.ground.empty()) faults.push_back("The ground needs at least one layer.");
    if (plan.ground.size() > most_layers)
        faults.push_back("A plan holds at most " + std::to_string(most_layers) + " layers.");
    for (std::size_t i = 0; i < plan.ground.size(); ++i)
        matter_faults(plan.ground[i].matter, "layer " + std::to_string(i + 1), faults);
    if (plan.target.filling == Filling::own) matter_faults(plan.target.own, "the target", faults);
    for (std::string& fault : number_faults(plan)) faults.push_back(std::move(fault));

    const Target& target = plan.target;
    if (target.shape != TargetShape::flat && target.count > 1 && target.gap < target.size)
        faults.push_back("Targets of " + token(target.size, Quantity::small_length) + " with their centres " +
                         token(target.gap, Quantity::length) +
                         " apart would overlap: the gap (target.gap) must be at least " +
                         token(target.size, Quantity::small_length) + ".");
    if (plan.antenna.channels > 1 && !(plan.antenna.channel_spacing > 0))
        faults.push_back("An antenna of several channels needs the distance between them (antenna.channel_spacing).");
    if (std::string fault = outline_fault(plan.lanes.outline); !fault.empty()) faults.push_back(std::move(fault));
    return faults;
}

}  // namespace gg

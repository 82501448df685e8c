// The choices of a plan, and the layers that come and go with them.
#include <algorithm>
#include <span>

#include "survey/fields.hpp"

namespace gg {

namespace {

template <class T>
struct Named {
    T value;
    const char *id, *name;
};

constexpr Named<TargetShape> shapes[] = {{TargetShape::round, "round", "Pipe, bar or cable"},
                                         {TargetShape::flat, "flat", "Flat layer or split"},
                                         {TargetShape::compact, "compact", "Stone or short void"}};
constexpr Named<Filling> fillings[] = {{Filling::metal, "metal", "Metal"},
                                       {Filling::plastic_air, "plastic-air", "Plastic, empty"},
                                       {Filling::plastic_water, "plastic-water", "Plastic, full of water"},
                                       {Filling::concrete, "concrete", "Concrete"},
                                       {Filling::air, "air", "Air: a void"},
                                       {Filling::water, "water", "Water"},
                                       {Filling::own, "own", "Chosen material"}};
constexpr Named<PulseFamily> families[] = {{PulseFamily::ricker, "ricker", "Ricker"},
                                           {PulseFamily::gaussian_derivative, "gaussian-derivative", "By bandwidth"}};
constexpr Named<bool> ways[] = {{false, "no", "One direction"}, {true, "yes", "Both directions"}};

std::span<const Named<TargetShape>> names_of(const TargetShape&) { return shapes; }
std::span<const Named<Filling>> names_of(const Filling&) { return fillings; }
std::span<const Named<PulseFamily>> names_of(const PulseFamily&) { return families; }
std::span<const Named<bool>> names_of(const bool&) { return ways; }

/// The table: every choice of a plan, in file order.
template <class P, class Visit>
void each_choice(P& plan, Visit&& visit) {
    for (std::size_t i = 0; i < plan.ground.size(); ++i)
        visit("ground." + std::to_string(i) + ".material", "Material", plan.ground[i].matter);
    visit("target.shape", "Shape", plan.target.shape);
    visit("target.filling", "Made of", plan.target.filling);
    if (plan.target.filling == Filling::own) visit("target.own.material", "Material", plan.target.own);
    visit("antenna.family", "Pulse", plan.antenna.pulse.family);
    visit("lanes.both_ways", "Lines walked", plan.lanes.both_ways);
}

template <class T>
std::vector<Choice::Option> options_for(const T& slot) {
    std::vector<Choice::Option> options;
    for (const auto& row : names_of(slot)) options.push_back({row.id, row.name});
    return options;
}
std::vector<Choice::Option> options_for(const Matter&) {
    std::vector<Choice::Option> options;
    for (const CatalogueRow& row : catalogue())
        if (row.material.model != Model::metal) options.push_back({row.id, row.name});
    options.push_back({"own", "Own numbers"});
    return options;
}

template <class T>
std::string id_of(const T& slot) {
    for (const auto& row : names_of(slot))
        if (row.value == slot) return row.id;
    return {};
}
std::string id_of(const Matter& slot) { return slot.material; }

template <class T>
void choose(T& slot, std::string_view id) {
    for (const auto& row : names_of(slot))
        if (row.id == id) slot = row.value;
}
void choose(Matter& slot, std::string_view id) { slot = matter_of(id); }

}  // namespace

std::vector<Choice> choices_of(const Plan& plan) {
    std::vector<Choice> choices;
    each_choice(plan, [&](const std::string& key, const char* label, const auto& slot) {
        choices.push_back({key, label, options_for(slot)});
    });
    return choices;
}

std::optional<std::string> choice_at(const Plan& plan, std::string_view key) {
    std::optional<std::string> found;
    each_choice(plan, [&](const std::string& at, const char*, const auto& slot) {
        if (at == key) found = id_of(slot);
    });
    return found;
}

std::string set_choice(Plan& plan, std::string_view key, std::string_view option) {
    std::string fault = "There is no choice \"" + std::string(key) + "\" in this plan.";
    each_choice(plan, [&](const std::string& at, const char* label, auto& slot) {
        if (at != key) return;
        const auto options = options_for(slot);
        const auto has = [&](const Choice::Option& o) { return o.id == option; };
        if (std::any_of(options.begin(), options.end(), has)) {
            choose(slot, option);
            fault.clear();
        } else {
            fault = std::string(label) + " has no option \"" + std::string(option) + "\"; there are ";
            for (std::size_t i = 0; i < options.size(); ++i) fault += (i ? ", " : "") + options[i].id;
            fault += ".";
        }
    });
    if (!fault.empty()) return fault;
    if (plan.target.filling == Filling::own && plan.target.own == Matter{}) plan.target.own = matter_of("own");
    plan = at_rest(std::move(plan));
    return {};
}

std::string add_layer(Plan& plan, int above) {
    const int count = static_cast<int>(plan.ground.size());
    if (above < 0 || above >= count) return "There is no such layer.";
    if (count >= most_layers) return "A plan holds at most " + std::to_string(most_layers) + " layers.";
    const Layer twin = plan.ground[static_cast<std::size_t>(above)];
    plan.ground.insert(plan.ground.begin() + above, twin);
    return {};
}

std::string remove_layer(Plan& plan, int index) {
    const int count = static_cast<int>(plan.ground.size());
    if (index < 0 || index >= count) return "There is no such layer.";
    if (count == 1) return "The ground needs at least one layer.";
    plan.ground.erase(plan.ground.begin() + index);
    plan = at_rest(std::move(plan));
    return {};
}

}  // namespace gg

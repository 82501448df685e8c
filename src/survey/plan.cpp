#include "survey/plan.hpp"

namespace gg {

namespace {

// Stands in for a ground that nobody described: middling soil (Davis & Annan 1989 list 5 to 30 for most of them).
constexpr double middling_permittivity = 9.0;

double at_end(const Range& range, int end) { return end < 0 ? range.low : end > 0 ? range.high : range.likely; }

}  // namespace

Material material_of(const Matter& matter, const Inputs<int>& ends) {
    const CatalogueRow* row = find_material(matter.material);
    Material material = row ? row->material : constant_material(middling_permittivity, 0.0);
    for (int i = 0; i < input_count; ++i) {
        const auto input = static_cast<Input>(i);
        if (takes(material.model, input)) material.inputs[input] = at_end(matter.inputs[input], ends[input]);
    }
    return material;
}

Matter matter_of(std::string_view catalogue_id) {
    Matter matter;
    if (const CatalogueRow* row = find_material(catalogue_id)) {
        matter.material = row->id;
        for (int i = 0; i < input_count; ++i) {
            const auto input = static_cast<Input>(i);
            if (takes(row->material.model, input)) matter.inputs[input] = row->ranges[input];
        }
        return matter;
    }
    matter.inputs[Input::permittivity] = exactly(middling_permittivity);
    return matter;
}

Stack likely_stack(const Plan& plan) {
    Stack stack;
    for (const Layer& layer : plan.ground) stack.slabs.push_back({material_of(layer.matter), layer.thickness.likely});
    if (stack.slabs.empty()) stack.slabs.push_back({material_of(matter_of("own")), 1.0});
    return stack;
}

Material filling_of(const Target& target) {
    switch (target.filling) {
        case Filling::metal: {
            Material metal;
            metal.model = Model::metal;
            return metal;
        }
        case Filling::plastic_water:
        case Filling::water:
            return material_of(matter_of("fresh-water"));
        case Filling::concrete:
            return material_of(matter_of("concrete-damp"));
        case Filling::own:
            return material_of(target.own);
        case Filling::plastic_air:
        case Filling::air:
            break;
    }
    return air();
}

}  // namespace gg

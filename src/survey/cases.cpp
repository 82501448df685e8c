#include "survey/cases.hpp"

#include <algorithm>

namespace gg {
namespace {

/// Ends of one layer's inputs for the four extreme grounds.
struct Ends {
    Inputs<int> fastest{}, slowest{}, clearest{}, lossiest{};
    bool vary = false;
};

Ends ends_of(const Matter& matter, double frequency) {
    std::vector<Input> free;
    const Material base = material_of(matter);
    for (int i = 0; i < input_count; ++i) {
        const auto input = static_cast<Input>(i);
        const Range& r = matter.inputs[input];
        if (takes(base.model, input) && r.low < r.high) free.push_back(input);
    }
    Ends ends;
    ends.vary = !free.empty();
    PlaneWave first = plane_wave(base, frequency);
    double fast = first.speed, slow = first.speed, clear = first.attenuation, lossy = first.attenuation;
    const unsigned corners = 1u << free.size();
    for (unsigned c = 0; c < corners && ends.vary; ++c) {
        Material material = base;
        Inputs<int> at{};
        for (std::size_t i = 0; i < free.size(); ++i) {
            const bool high = (c >> i & 1u) != 0;
            at[free[i]] = high ? 1 : -1;
            material.inputs[free[i]] = high ? matter.inputs[free[i]].high : matter.inputs[free[i]].low;
        }
        const PlaneWave w = plane_wave(material, frequency);
        // Ends that cannot go together (sand and clay above one) or a model driven out of its physics prove nothing.
        if (w.issue != Issue::none && w.issue != Issue::outside_band) continue;
        if (w.speed > fast) fast = w.speed, ends.fastest = at;
        if (w.speed < slow) slow = w.speed, ends.slowest = at;
        if (w.attenuation < clear) clear = w.attenuation, ends.clearest = at;
        if (w.attenuation > lossy) lossy = w.attenuation, ends.lossiest = at;
    }
    return ends;
}

using Grounds = std::vector<std::unique_ptr<Ground>>;

std::unique_ptr<Ground> ground_of(const Plan& plan, Stack stack, const Grounds& before) {
    auto ground = std::make_unique<Ground>();
    ground->stack = std::move(stack);
    PathSpectrum& spectrum = ground->spectrum;
    spectrum.sent = before.empty() ? std::make_shared<SentSpectrum>(plan.antenna.pulse) : before[0]->spectrum.sent;
    for (std::size_t i = 0; i < ground->stack.slabs.size(); ++i) {
        const Material& material = ground->stack.slabs[i].material;
        ground->waves.push_back(plane_wave(material, plan.antenna.pulse.centre_frequency));
        const auto same = std::find_if(before.begin(), before.end(),
                                       [&](const auto& other) { return other->stack.slabs[i].material == material; });
        spectrum.layers.push_back(same != before.end()
                                      ? (*same)->spectrum.layers[i]
                                      : std::make_shared<Wavenumbers>(wavenumbers_of(material, *spectrum.sent)));
    }
    return ground;
}

/// Thickness ends: `sign` +1 thickens a layer that is better than the one below it (lower `badness`), -1 thins it.
void set_thickness(const Plan& plan, Stack& stack, bool by_loss, int sign) {
    const double f = plan.antenna.pulse.centre_frequency;
    for (std::size_t i = 0; i + 1 < stack.slabs.size(); ++i) {
        const Range& h = plan.ground[i].thickness;
        if (!(h.low < h.high)) continue;
        const PlaneWave here = plane_wave(stack.slabs[i].material, f),
                        below = plane_wave(stack.slabs[i + 1].material, f);
        const bool better = by_loss ? here.attenuation < below.attenuation : here.speed > below.speed;
        stack.slabs[i].thickness = better == (sign > 0) ? h.high : h.low;
    }
}

Case case_of(const Plan& plan, const Ground& ground, double depth) {
    Case c;
    c.ground = &ground;
    c.depth = depth;
    c.height = plan.antenna.height;
    c.separation = plan.antenna.separation;
    c.layer = layer_at(ground.stack, depth);
    c.path = c.path_to(depth);
    c.echo = EchoPulse(ground.spectrum, ground.stack, depth, c.height);
    return c;
}

}  // namespace

Path Case::path_to(double z) const {
    Path p;
    p.add(speed_of_light, height);
    double top = 0.0;
    const std::size_t n = ground->waves.size();
    for (std::size_t i = 0; i < n && top < z; ++i) {
        const double h = i + 1 == n ? z - top : std::min(ground->stack.slabs[i].thickness, z - top);
        p.add(ground->waves[i].speed, h);
        top += h;
    }
    return p;
}

double Case::arrival() const { return 2.0 * leg_to(path, 0.5 * separation).time; }

double Case::mean_speed() const { return depth / (path.time_down() - height / speed_of_light); }

Cases cases_of(const Plan& plan) {
    Cases cases;
    Stack likely;
    std::vector<Ends> ends;
    bool vary = false;
    for (std::size_t i = 0; i < plan.ground.size(); ++i) {
        const Layer& layer = plan.ground[i];
        likely.slabs.push_back({material_of(layer.matter), layer.thickness.likely});
        ends.push_back(ends_of(layer.matter, plan.antenna.pulse.centre_frequency));
        const bool last = i + 1 == plan.ground.size();
        vary = vary || ends.back().vary || (!last && layer.thickness.low < layer.thickness.high);
    }
    cases.grounds.push_back(ground_of(plan, likely, cases.grounds));

    const Range& depth = plan.target.depth;
    cases.all.push_back(case_of(plan, *cases.grounds[0], depth.likely));
    const bool deep = depth.low < depth.high;
    const auto at = [&](const Ground& g, double d) { cases.all.push_back(case_of(plan, g, d)); };
    if (!vary) {
        if (deep) at(*cases.grounds[0], depth.low), at(*cases.grounds[0], depth.high);
        return cases;
    }
    const auto extreme = [&](Inputs<int> Ends::*which, bool by_loss, int sign) -> const Ground& {
        Stack stack = likely;
        for (std::size_t i = 0; i < plan.ground.size(); ++i) {
            stack.slabs[i].material = material_of(plan.ground[i].matter, ends[i].*which);
        }
        set_thickness(plan, stack, by_loss, sign);
        cases.grounds.push_back(ground_of(plan, std::move(stack), cases.grounds));
        return *cases.grounds.back();
    };
    const Ground& fastest = extreme(&Ends::fastest, false, 1);
    const Ground& slowest = extreme(&Ends::slowest, false, -1);
    const Ground& clearest = extreme(&Ends::clearest, true, 1);
    const Ground& lossiest = extreme(&Ends::lossiest, true, -1);
    // Lengths grow with speed and depth, times with slowness and depth: both ends of each need both ends of the depth.
    at(fastest, depth.low), at(slowest, depth.high);
    if (deep) at(fastest, depth.high), at(slowest, depth.low);
    at(clearest, depth.low), at(lossiest, depth.high);
    return cases;
}

}  // namespace gg

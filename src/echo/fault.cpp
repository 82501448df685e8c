#include <cmath>
#include <string>

#include "echo/scene.hpp"

namespace gg {
namespace {

bool within(double x, double low, double high) { return x >= low && x <= high; }

std::string millimetres(double m) {
    const double mm = std::round(m * 1000.0);
    return std::to_string(static_cast<long long>(mm)) + " mm";
}

std::string numbers_fault(const Scene& s) {
    if (s.ground.slabs.empty()) return "The ground has no layer; give it at least one.";
    for (std::size_t i = 0; i + 1 < s.ground.slabs.size(); ++i) {
        if (!within(s.ground.slabs[i].thickness, 1e-4, 1e3)) return "A layer must be between 0.1 mm and 1000 m thick.";
    }
    for (const Slab& slab : s.ground.slabs) {
        if (slab.material.model == Model::metal) return "The ground cannot be metal; only a target may be.";
    }
    if (!within(s.pulse.centre_frequency, 1e6, 2e10)) return "The centre frequency must lie between 1 MHz and 20 GHz.";
    if (!within(s.separation, 0.0, 20.0)) return "Transmitter and receiver must be 0 to 20 m apart.";
    if (!within(s.height, 0.0, 20.0)) return "The antenna must be 0 to 20 m above the ground.";
    const Sampling& p = s.sampling;
    if (!within(p.first, -1e4, 1e4)) return "The line must start within 10 km of the origin.";
    if (!within(p.step, 1e-4, 100.0)) return "The step must lie between 0.1 mm and 100 m.";
    if (!within(p.traces, 1, 4096)) return "A section has 1 to 4096 traces.";
    if (!within(p.samples, 2, 8192)) return "A trace has 2 to 8192 samples.";
    if (!within(p.window * s.pulse.centre_frequency, 0.1, 1000.0)) {
        return "The time window must be a tenth to a thousand periods of the centre frequency long.";
    }
    if (!within(p.start * s.pulse.centre_frequency, -100.0, 1000.0)) {
        return "The trace must start between 100 periods before and 1000 after the pulse is sent.";
    }
    if (!within(s.noise.dynamic_range, 0.0, 400.0)) return "The dynamic range must lie between 0 and 400 dB.";
    if (s.noise.stacks < 1) return "At least one trace goes into a stack.";
    return {};
}

std::string target_fault(const Scene& s, std::size_t q) {
    const RoundTarget& t = s.targets[q];
    if (!within(t.radius, 1e-4, 10.0)) return "A target's radius must lie between 0.1 mm and 10 m.";
    if (!within(t.x, -1e4, 1e4) || !within(t.depth, 0.0, 1e3))
        return "A target must lie within 1000 m depth and 10 km of the line.";
    if (t.wall && !(t.wall->thickness > 0.0 && t.wall->thickness < t.radius)) {
        return "A pipe's wall must be thinner than its radius.";
    }
    if (!(t.depth > t.radius)) {
        return "A target breaks the surface: its centre must lie deeper than " + millimetres(t.radius) +
               ", its radius.";
    }
    const int layer = layer_at(s.ground, t.depth);
    const double top = top_of(s.ground, layer);
    const bool last = layer + 1 == static_cast<int>(s.ground.slabs.size());
    const double bottom = last ? 1e9 : top + s.ground.slabs[static_cast<std::size_t>(layer)].thickness;
    if (!(t.depth - t.radius > top && t.depth + t.radius < bottom)) {
        return "A target straddles the boundary at a depth of " + millimetres(t.depth - t.radius > top ? bottom : top) +
               "; it has to lie within one layer.";
    }
    for (std::size_t p = 0; p < q; ++p) {
        const RoundTarget& other = s.targets[p];
        if (layer_at(s.ground, other.depth) != layer)
            return "All targets of one section have to lie in the same layer.";
        if (!(std::hypot(t.x - other.x, t.depth - other.depth) > t.radius + other.radius)) {
            return "Two targets touch or overlap; centre to centre they need more than " +
                   millimetres(t.radius + other.radius) + ".";
        }
    }
    return {};
}

}  // namespace

std::string fault_of(const Scene& scene) {
    std::string fault = numbers_fault(scene);
    if (fault.empty() && scene.targets.size() > 6) return "A section holds at most six targets.";
    for (std::size_t q = 0; fault.empty() && q < scene.targets.size(); ++q) fault = target_fault(scene, q);
    return fault;
}

Issue materials_issue(const Scene& scene) {
    Issue worst = Issue::none;
    const auto ask = [&](const Material& material) {
        if (material.model == Model::metal) return;
        const Issue issue = permittivity(material, scene.pulse.centre_frequency).issue;
        if (worst == Issue::none || (worst == Issue::outside_band && issue != Issue::none)) worst = issue;
    };
    for (const Slab& slab : scene.ground.slabs) ask(slab.material);
    for (const RoundTarget& target : scene.targets) {
        ask(target.inside);
        if (target.wall) ask(target.wall->material);
    }
    return worst;
}

}  // namespace gg

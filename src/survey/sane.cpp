#include "survey/sane.hpp"

#include <algorithm>
#include <cmath>

namespace gg {
namespace {

constexpr std::size_t most_layers = 8;
constexpr std::size_t most_corners = 500;

/// Moves `x` into [low, high]; NaN goes to `fallback`. Writes the sentence once.
void hold(double& x, double low, double high, double fallback, const char* what, std::string& told) {
    const double before = x;
    if (std::isnan(x)) x = fallback;
    x = std::clamp(x, low, high);
    if (!(before == x) && told.empty()) told = what;
}

void hold(Range& r, double low, double high, double fallback, const char* what, std::string& told) {
    hold(r.likely, low, high, fallback, what, told);
    hold(r.low, low, high, r.likely, what, told);
    hold(r.high, low, high, r.likely, what, told);
    if (r.low > r.likely || r.high < r.likely) {
        if (told.empty()) told = "A range must run from low over likely to high.";
        r.low = std::min(r.low, r.likely);
        r.high = std::max(r.high, r.likely);
    }
}

void hold(int& n, int low, int high, const char* what, std::string& told) {
    if (n < low || n > high) {
        n = std::clamp(n, low, high);
        if (told.empty()) told = what;
    }
}

void hold(Matter& matter, std::string& told) {
    const Material material = material_of(matter);
    for (int i = 0; i < input_count; ++i) {
        const auto input = static_cast<Input>(i);
        Range& r = matter.inputs[input];
        if (!takes(material.model, input)) continue;
        const Range legal = legal_range(input);
        hold(r, legal.low, legal.high, legal.likely, "A number of the ground is outside what it can be.", told);
    }
}

}  // namespace

Sane make_sane(const Plan& given) {
    Sane s{.plan = given, .ground = {}, .target = {}, .antenna = {}, .pass = {}, .lanes = {}, .need = {}};
    Plan& p = s.plan;

    if (p.ground.empty()) {
        s.ground = "The ground needs at least one layer.";
        Layer layer;
        layer.matter = matter_of("own");
        layer.matter.inputs[Input::permittivity] = exactly(9.0);
        layer.matter.inputs[Input::conductivity] = exactly(0.001);
        p.ground.push_back(layer);
    }
    if (p.ground.size() > most_layers) {
        s.ground = "The ground can have eight layers at most.";
        p.ground.resize(most_layers);
    }
    for (Layer& layer : p.ground) {
        hold(layer.matter, s.ground);
        const bool last = &layer == &p.ground.back();
        std::string unused;
        hold(layer.thickness, 1e-3, 1e3, 1.0, "A layer's thickness must be more than nothing.",
             last ? unused : s.ground);
    }

    Target& t = p.target;
    if (t.filling == Filling::own) hold(t.own, s.target);
    hold(t.size, 1e-4, 100.0, 0.1, "The target's size must be more than nothing.", s.target);
    hold(t.depth, 1e-3, 1e3, 1.0, "The target's depth must be more than nothing.", s.target);
    hold(t.count, 1, 12, "There can be 1 to 12 targets.", s.target);
    hold(t.gap, 1e-3, 1e3, 0.4, "The gap between targets must be more than nothing.", s.target);
    hold(t.length, 1e-3, 1e5, 20.0, "The target's length must be more than nothing.", s.target);
    hold(t.bearing, -100.0, 100.0, 0.0, "The target's bearing must be an angle.", s.target);

    Antenna& a = p.antenna;
    hold(a.pulse.centre_frequency, 1e6, 2e10, 4e8, "The centre frequency must lie between 1 MHz and 20 GHz.",
         s.antenna);
    hold(a.pulse.bandwidth, 0.3, 1.6, 1.34, "The bandwidth must lie between 0.3 and 1.6 of the centre.", s.antenna);
    hold(a.separation, 0.0, 100.0, 0.0, "The separation of transmitter and receiver cannot be that.", s.antenna);
    hold(a.height, 0.0, 100.0, 0.0, "The antenna's height cannot be that.", s.antenna);
    hold(a.dynamic_range, 1.0, 300.0, 120.0, "The dynamic range must be more than nothing.", s.antenna);
    hold(a.channels, 1, 64, "There can be 1 to 64 channels.", s.antenna);
    hold(a.channel_spacing, 0.0, 10.0, 0.0, "The channel spacing cannot be that.", s.antenna);

    Pass& w = p.pass;
    hold(w.step, 1e-4, 100.0, 0.02, "The step must be more than nothing.", s.pass);
    hold(w.window, 1e-11, 1e-3, 6e-8, "The time window must be more than nothing.", s.pass);
    hold(w.samples, 2, 65536, "A trace needs 2 to 65536 samples.", s.pass);
    hold(w.stacks, 1, 65536, "Stacks must be 1 or more.", s.pass);
    hold(w.trace_rate, 1e-3, 1e6, 100.0, "The trace rate must be more than nothing.", s.pass);

    Lanes& l = p.lanes;
    for (SitePoint& c : l.outline) {
        hold(c.x, -1e5, 1e5, 0.0, "A corner of the site is not a place.", s.lanes);
        hold(c.y, -1e5, 1e5, 0.0, "A corner of the site is not a place.", s.lanes);
    }
    if (l.outline.size() > most_corners) {
        s.lanes = "The site can have 500 corners at most.";
        l.outline.resize(most_corners);
    }
    hold(l.spacing, 1e-2, 1e4, 0.5, "The line spacing must be more than nothing.", s.lanes);
    hold(l.bearing, -100.0, 100.0, 0.0, "The direction of travel must be an angle.", s.lanes);

    Need& n = p.need;
    hold(n.smallest, 0.0, 1e3, 0.0, "The smallest target asked for cannot be that.", s.need);
    hold(n.deepest, 0.0, 1e3, 0.0, "The greatest depth asked for cannot be that.", s.need);
    hold(n.closest, 0.0, 1e3, 0.0, "The closest pair asked for cannot be that.", s.need);
    hold(n.depth_accuracy, 0.0, 1e3, 0.0, "The depth accuracy asked for cannot be that.", s.need);
    return s;
}

}  // namespace gg

#pragma once
/// Plans, a canvas that keeps count, and an XML reader for the tests of the pictures.
#include <cmath>
#include <string>
#include <string_view>
#include <vector>

#include "draw/figure.hpp"
#include "draw/svg_canvas.hpp"

namespace gg {

inline Plan pipe_plan() {
    Plan plan;
    plan.ground = {{matter_of("silty-sand"), exactly(0.5)}, {matter_of("wet-clay"), exactly(1.0)}};
    plan.antenna.pulse.centre_frequency = 400e6;
    plan.target.bearing = 0.7;
    // Rulers that hold 1, 2, 4 ... of these change their number nowhere near: a drag of a few pixels keeps it.
    plan.lanes.spacing = 0.6;
    plan.pass.samples = 600;
    return plan;
}

inline Plan bars_plan() {
    Plan plan = pipe_plan();
    plan.ground = {{matter_of("asphalt"), exactly(0.06)},
                   {matter_of("concrete-damp"), exactly(0.2)},
                   {matter_of("dry-sand"), exactly(1.0)}};
    plan.target.filling = Filling::metal;
    plan.target.size = 0.016;
    plan.target.depth = exactly(0.09);
    plan.target.count = 4;
    plan.target.gap = 0.15;
    plan.antenna.pulse.centre_frequency = 1.5e9;
    plan.antenna.separation = 0.06;
    plan.pass.window = 12e-9;
    plan.lanes.spacing = 0.15;
    plan.pass.samples = 400;
    plan.lanes.both_ways = true;
    return plan;
}

inline Plan footing_plan() {
    Plan plan = pipe_plan();
    plan.target.shape = TargetShape::flat;
    plan.target.filling = Filling::concrete;
    plan.target.size = 0.3;
    plan.target.depth = exactly(1.4);
    plan.antenna.pulse.centre_frequency = 250e6;
    plan.antenna.height = 0.1;
    plan.lanes.bearing = 0.5;
    return plan;
}

/// Plans at the edge of sense and beyond it.
inline std::vector<Plan> extreme_plans() {
    std::vector<Plan> out;
    const auto add = [&](auto change) {
        Plan plan = pipe_plan();
        change(plan);
        out.push_back(plan);
    };
    add([](Plan& p) { p.target.depth = exactly(0.0); });
    add([](Plan& p) { p.target.depth = exactly(50.0), p.target.size = 1e-3; });
    add([](Plan& p) { p.target.size = 20.0; });
    add([](Plan& p) { p.target.count = 12, p.target.gap = 30.0; });
    add([](Plan& p) { p.target.gap = 0.0; });
    add([](Plan& p) { p.antenna.pulse.centre_frequency = 1e7; });
    add([](Plan& p) { p.antenna.pulse.centre_frequency = 6e9; });
    add([](Plan& p) { p.antenna.height = 20.0, p.antenna.separation = 9.0; });
    add([](Plan& p) { p.pass.samples = 2; });
    add([](Plan& p) { p.pass.samples = 65536, p.pass.window = 1e-3; });
    add([](Plan& p) { p.pass.window = 1e-10; });
    add([](Plan& p) { p.lanes.spacing = 1e-3; });
    add([](Plan& p) { p.lanes.spacing = 1e4; });
    add([](Plan& p) { p.lanes.outline = {{0, 0}, {1, 1}}; });
    add([](Plan& p) { p.lanes.outline.clear(); });
    add([](Plan& p) { p.ground.assign(8, {matter_of("peat"), exactly(1e-3)}); });
    add([](Plan& p) { p.ground.clear(); });
    add([](Plan& p) { p.target.depth = exactly(std::nan("")), p.target.size = std::nan(""); });
    add([](Plan& p) { p.lanes.bearing = INFINITY, p.target.bearing = std::nan(""); });
    return out;
}

inline FigureStyle style_of(double width, double height) {
    FigureStyle style;
    style.box = {0, 0, width, height};
    return style;
}

struct Drawn {
    std::string svg;
    Figure figure;
};
inline Drawn draw(const ViewRow& view, const Plan& plan, const Answers& answers, const FigureStyle& style) {
    SvgCanvas canvas(style.box.width, style.box.height, view.name);
    Drawn out;
    out.figure = view.draw(canvas, plan, answers, style);
    canvas.describe(out.figure.description);
    out.svg = canvas.finish();
    return out;
}

/// The words that stand in the picture, a line each; not its description.
inline std::string words_in(const std::string& svg) {
    std::string out;
    for (std::size_t i = svg.find("<text"); i != svg.npos; i = svg.find("<text", i + 1)) {
        const std::size_t from = svg.find('>', i) + 1;
        out += svg.substr(from, svg.find('<', from) - from) + '\n';
    }
    return out;
}

/// Empty when `xml` is well-formed as far as our own writer can go wrong: tags nest and close, attributes are quoted,
/// no bare & or <, one root. Else what is wrong.
inline std::string xml_fault(std::string_view xml) {
    std::vector<std::string> open;
    bool rooted = false;
    for (std::size_t i = 0; i < xml.size();) {
        if (xml[i] == '&') {
            const std::size_t end = xml.find(';', i);
            const std::string_view name = end == xml.npos ? "" : xml.substr(i + 1, end - i - 1);
            if (name != "amp" && name != "lt" && name != "gt" && name != "quot")
                return "a bare & at " + std::to_string(i);
        }
        if (xml[i] != '<') {
            if (open.empty() && xml[i] != '\n') return "text outside the root";
            ++i;
            continue;
        }
        std::size_t end = i + 1;
        bool quoted = false;
        for (; end < xml.size() && (quoted || xml[end] != '>'); ++end) {
            if (xml[end] == '"') quoted = !quoted;
            if (xml[end] == '<') return "a < inside a tag";
        }
        if (end >= xml.size()) return "a tag that never ends";
        std::string tag(xml.substr(i + 1, end - i - 1));
        i = end + 1;
        if (tag[0] == '/') {
            if (open.empty() || open.back() != tag.substr(1)) return "</" + tag.substr(1) + "> closes nothing";
            open.pop_back();
            continue;
        }
        const std::string name = tag.substr(0, tag.find_first_of(" /"));
        if (open.empty() && rooted) return "a second root";
        rooted = true;
        if (tag.back() != '/') open.push_back(name);
    }
    return open.empty() && rooted ? "" : "something stays open";
}

}  // namespace gg

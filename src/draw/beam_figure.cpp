#include <algorithm>
#include <array>
#include <cmath>

#include "draw/parts.hpp"
#include "draw/textures.hpp"

namespace gg {
namespace {

/// Where the ground lies on the screen: one scale for both axes, so that shapes are true.
struct Cut {
    Box plot;
    double scale = 1.0;    ///< css px per m
    double surface = 0.0;  ///< y of the surface
    double middle = 0.0;   ///< x of the antenna

    Point at(double x, double depth) const { return {middle + x * scale, surface + depth * scale}; }
    Point at(Crossing c) const { return at(c.x, c.depth); }
    double depth_shown() const { return (plot.bottom() - surface) / scale; }
    double half_width() const { return 0.5 * plot.width / scale; }
};

struct Beam : Sketch {
    using Sketch::Sketch;
    Cut cut;
    double depth = std::max(0.0, plan.target.depth.likely), size = std::max(0.0, plan.target.size);  ///< m, of the top

    bool flat() const { return plan.target.shape == TargetShape::flat; }
    int count() const { return flat() ? 1 : std::clamp(plan.target.count, 1, 12); }
};

Cut make_cut(const Plan& plan, const Answers& answers, const FigureStyle& style) {
    const double depth = std::max(1e-3, plan.target.depth.likely), size = std::max(1e-3, plan.target.size);
    // Round extents, so that the scale stands still while something is dragged a little.
    double bottom =
        std::max(answers.beam.max_depth, depth + (plan.target.shape == TargetShape::flat ? 0.0 : size) + 0.25 * depth);
    bottom = nice_ceiling(bottom);
    const double height = std::max(0.0, plan.antenna.height);
    Cut cut;
    const double gutter = std::min(0.2 * style.box.width, 3.7 * style.text);
    cut.plot = {style.box.x + gutter, style.box.y, style.box.width - gutter, style.box.height};
    const double air = std::min(0.3 * style.box.height, 3.6 * style.text);
    const double half = 1.1 * std::max({answers.beam.patch_along, 0.8 * plan.antenna.separation, 1.2 * size,
                                        plan.target.count > 1 ? std::min(plan.target.gap + size, bottom) : 0.0});
    cut.scale = (cut.plot.height - air) / (bottom + height);
    if (half > 0) cut.scale = std::min(cut.scale, 0.5 * cut.plot.width / nice_ceiling(half));
    cut.surface = cut.plot.y + air + height * cut.scale;
    cut.middle = cut.plot.x + 0.5 * cut.plot.width;
    return cut;
}

void draw_ground(Beam& b) {
    const Cut& cut = b.cut;
    b.canvas.box({cut.plot.x, cut.plot.y, cut.plot.width, cut.surface - cut.plot.y}, b.colours.paper);
    double top = 0.0;
    for (std::size_t i = 0; i < b.plan.ground.size() && i < 8; ++i) {
        const bool last = i + 1 == b.plan.ground.size();
        const double bottom = last
                                  ? cut.depth_shown()
                                  : std::min(cut.depth_shown(), top + std::max(0.0, b.plan.ground[i].thickness.likely));
        const Box box{cut.plot.x, cut.at(0, top).y, cut.plot.width, (bottom - top) * cut.scale};
        if (!(box.height > 0)) break;
        b.canvas.box(box, b.colours.earth[i]);
        draw_texture(b.canvas, box, cut.at(0, 0), texture_of(b.plan.ground[i].matter),
                     b.colours.earth_mark.with_alpha(0.6));
        if (i > 0) b.canvas.line(points({Point{box.x, box.y}, Point{box.right(), box.y}}), {b.colours.earth_mark, 1.2});
        top = bottom;
    }
    b.canvas.line(points({Point{cut.plot.x, cut.surface}, Point{cut.plot.right(), cut.surface}}), {b.colours.ink, 2});
}

void draw_wave(Beam& b) {
    const std::vector<Ray>& edge = b.answers.beam.edge;
    if (edge.size() >= 2) {
        std::vector<Point> cone;
        for (const Crossing& c : edge[0].points) cone.push_back(b.cut.at(c));
        for (auto c = edge[1].points.rbegin(); c != edge[1].points.rend(); ++c) cone.push_back(b.cut.at(*c));
        if (cone.size() > 2) b.canvas.area(cone, b.colours.wave.with_alpha(0.16));
        for (const Ray& ray : {edge[0], edge[1]}) {
            std::vector<Point> line;
            for (const Crossing& c : ray.points) line.push_back(b.cut.at(c));
            b.canvas.line(line, {b.colours.wave.with_alpha(0.8), 1.3, 5, 4});
        }
    }
    const std::size_t arcs = b.answers.beam.arcs.size();
    const std::size_t every = std::max<std::size_t>(1, arcs / 120);  // beyond that arcs are one grey
    for (std::size_t i = 0; i < arcs; i += every) {
        std::vector<Point> line;
        for (const Crossing& c : b.answers.beam.arcs[i].points) line.push_back(b.cut.at(c));
        const double fade = 0.85 - 0.5 * static_cast<double>(i) / static_cast<double>(arcs);
        b.canvas.line(line, {b.colours.wave.with_alpha(fade), 1.6});
    }
}

/// x of each target, m: one under the antenna, the others beside it.
std::vector<double> places(const Beam& b) {
    std::vector<double> out;
    const int n = b.count(), before = (n - 1) / 2;
    for (int i = 0; i < n; ++i) out.push_back((i - before) * b.plan.target.gap);
    return out;
}

void draw_targets(Beam& b) {
    const double r = 0.5 * b.size * b.cut.scale;
    if (b.flat()) {
        const Box box{b.cut.plot.x, b.cut.at(0, b.depth).y, b.cut.plot.width, std::max(2.0, 2 * r)};
        const Filling filling = b.plan.target.filling;
        const bool water = filling == Filling::water || filling == Filling::plastic_water;
        const bool air = filling == Filling::air || filling == Filling::plastic_air;
        b.canvas.box(box, filling == Filling::metal ? b.colours.ink
                          : water                   ? b.colours.wave_soft
                          : air                     ? b.colours.paper
                                                    : b.colours.hairline);
        if (water || filling == Filling::concrete) {
            draw_texture(b.canvas, box, b.cut.at(0, b.depth), water ? Texture::waves : Texture::triangles,
                         b.colours.earth_mark);
        }
        for (const double y : {box.y, box.bottom()})
            b.canvas.line(points({{box.x, y}, {box.right(), y}}), {b.colours.ink, 1.4});
        return;
    }
    for (const double x : places(b)) {
        const Point centre = b.cut.at(x, b.depth + 0.5 * b.size);
        draw_round(b.canvas, b.colours, centre, std::max(3.0, r), b.plan.target.filling);
        b.labels.keep_round(centre, std::max(3.0, r));
    }
}

void draw_antenna(Beam& b) {
    const double half = 0.5 * std::max(0.0, b.plan.antenna.separation), unit = b.style.text;
    const double foot_y = b.cut.at(0, -std::max(0.0, b.plan.antenna.height)).y,
                 foot = std::clamp(0.3 * half * b.cut.scale, 0.35 * unit, 1.1 * unit);
    const double left = b.cut.at(-half, 0).x, right = b.cut.at(half, 0).x;
    const Box body{left - foot - 5, foot_y - 1.35 * unit, right - left + 2 * foot + 10, 0.85 * unit};
    b.canvas.box(body, b.colours.ink, 4);
    for (const double x : {left, right})
        b.canvas.box({x - foot, foot_y - 0.55 * unit, 2 * foot, 0.55 * unit}, b.colours.wave, 2);
    b.labels.keep({body.x, body.y, body.width, foot_y - body.y});
    if (b.plan.antenna.height > 0) {
        if (b.plan.antenna.height * b.cut.scale > 3) {
            draw_dimension(b.canvas, {body.right() + 12, foot_y}, {body.right() + 12, b.cut.surface},
                           {b.colours.soft_ink, 1});
        }
        b.labels.put({{body.right() + 20, body.y + 0.5 * body.height}}, b.length(b.plan.antenna.height) + " up",
                     {b.colours.soft_ink, 0.85 * unit, Across::left, Down::middle}, false);
    }
    const std::string words = say(b.plan.antenna.pulse.centre_frequency, Quantity::frequency, b.style.units);
    b.labels.put({{body.x - 8, body.y + body.height / 2}, {body.right() + 10, body.y + body.height / 2}}, words,
                 {b.colours.ink, unit, Across::right, Down::middle, true}, false);
}

void draw_depth_axis(Beam& b) {
    const Cut& cut = b.cut;
    const AxisUnit unit = length_axis(cut.depth_shown(), b.style.units);
    const double x = cut.plot.x, room = 2.6 * b.style.text;
    const TextStyle words{b.colours.soft_ink, b.small(), Across::right, Down::middle};
    for (const double t : ticks(0, cut.depth_shown() / unit.metres,
                                std::max(1, static_cast<int>(cut.depth_shown() * cut.scale / room)))) {
        const double y = cut.at(0, t * unit.metres).y;
        b.canvas.line(points({Point{x - 5, y}, Point{x, y}}), {b.colours.soft_ink, 1});
        b.labels.put({{x - 8, y}}, t == 0 ? "0 " + unit.name : tick_words(t), words, false);
    }
}

/// One period of a sine, as long as the wave is in the ground where the target lies, beside the target.
void draw_wavelength(Beam& b) {
    const double wavelength = b.answers.beam.wavelength_at_target, px = wavelength * b.cut.scale;
    if (!(px > 0)) return;
    const double half = b.flat() ? 0.0 : std::max(3.0, 0.5 * b.size * b.cut.scale);
    const double y = b.cut.at(0, b.depth).y + std::max(half, 0.6 * b.style.text) + 4;
    const double right = b.cut.middle - half - 12, left = right - px;
    if (left < b.cut.plot.x + 4) return;
    const double swing = std::clamp(0.22 * px, 3.0, 14.0);
    std::array<Point, 33> wave;
    for (std::size_t i = 0; i < wave.size(); ++i) {
        const double t = static_cast<double>(i) / 32.0;
        wave[i] = {left + px * t, y - swing * std::sin(6.28318530718 * t)};
    }
    b.canvas.line(wave, {b.colours.paper, 5});
    b.canvas.line(wave, {b.colours.wave, 2.6});
    for (const double x : {left, right}) {
        b.canvas.line(points({Point{x, y - swing - 2}, Point{x, y + swing + 2}}), {b.colours.wave, 1.4});
    }
    b.labels.keep({left, y - swing, px, 2 * swing});
    const Point grip = inside({left - grip_radius - 4, y}, b.cut.plot, grip_radius + 3);
    b.labels.keep_round(grip, grip_radius + 2);
    const double f = b.plan.antenna.pulse.centre_frequency;
    // Pulled out to the left the wave grows longer, so the frequency falls as 1 / length.
    b.figure.handles.push_back(
        {"antenna.frequency", "Centre frequency", grip, Handle::Way::across, f, f / px, {}, 1e6, true, 0.0});
    const TextStyle words{b.colours.wave, b.small(), Across::right, Down::top, true};
    const std::string said = "wavelength " + b.length(wavelength);
    // Clear of the grip under the target, and of the axis.
    const double end = std::max(std::min(right, b.cut.middle - b.beside_grip()),
                                b.cut.plot.x + b.canvas.measure(said, words) + 8),
                 under = y + swing + 5;
    b.labels.put({{end, under}, {end, under + 1.3 * b.style.text}, {end, under + 2.6 * b.style.text}}, said, words);
}

void draw_patch(Beam& b) {
    const double half = b.answers.beam.patch_along;
    if (!(half > 0)) return;
    const Point left = b.cut.at(-half, b.depth), right = b.cut.at(half, b.depth);
    b.canvas.push_clip(b.cut.plot);
    b.canvas.line(points({left, right}), {b.colours.wave, 3.5});
    for (const Point& p : {left, right})
        b.canvas.line(points({Point{p.x, p.y - 6}, Point{p.x, p.y + 6}}), {b.colours.wave, 2});
    b.canvas.pop_clip();
    const TextStyle words{b.colours.wave, b.style.text, Across::left, Down::bottom, true};
    const std::string said = "lit patch " + b.length(2 * half);
    const double row = left.y - 7,
                 start = std::min(b.cut.middle, b.cut.plot.right() - b.canvas.measure(said, words) - 16) + 8;
    b.labels.put({{start, row}, {start, row - 1.4 * b.style.text}, {left.x, row}}, said, words);
}

void add_target_handles(Beam& b) {
    const Cut& cut = b.cut;
    const double metre = 1 / cut.scale, top = cut.at(0, b.depth).y;
    const Point on_axis = inside({cut.plot.x + grip_radius + 4, top}, cut.plot, grip_radius + 3);
    b.figure.handles.push_back(
        {"target.depth", "Depth to top", on_axis, Handle::Way::down, b.depth, metre, {}, 0.01, false, 0.0});
    const double left = cut.middle - std::max(0.0, b.answers.beam.patch_along) * cut.scale;
    if (b.style.handles && left > on_axis.x + 20) {
        b.canvas.line(points({Point{on_axis.x, top}, Point{left, top}}), {b.colours.wave, 1.2, 3, 4});
    }
    b.labels.keep_round(on_axis, grip_radius + 2);

    const double bottom = cut.at(0, b.depth + b.size).y, reach = 22;
    const Point size_grip = inside({cut.middle, bottom + reach}, cut.plot, grip_radius + 3);
    if (b.style.handles) b.canvas.line(points({Point{cut.middle, bottom}, size_grip}), {b.colours.wave, 1.4});
    b.figure.handles.push_back(
        {"target.size", "Size", size_grip, Handle::Way::down, b.size, metre, {}, 0.001, false, 0.0});
    b.labels.keep_round(size_grip, grip_radius + 2);
    if (b.count() > 1) {
        const double x = cut.at(b.plan.target.gap, 0).x;
        const double drop = std::abs(x - size_grip.x) < 2 * grip_radius + 6 ? reach + 2 * grip_radius + 6 : reach;
        const Point grip = inside({x, bottom + drop}, cut.plot, grip_radius + 3);
        if (b.style.handles) b.canvas.line(points({Point{x, bottom}, grip}), {b.colours.wave, 1.4});
        b.figure.handles.push_back({"target.gap",
                                    "Gap, centre to centre",
                                    grip,
                                    Handle::Way::across,
                                    b.plan.target.gap,
                                    metre,
                                    {},
                                    0.01,
                                    false,
                                    0.0});
        b.labels.keep_round(grip, grip_radius + 2);
    }
}

void label_depth(Beam& b) {
    const Point grip = b.figure.handles.front().at;  // the depth's own, added first
    const double x = grip.x + b.beside_grip(), row = grip.y - 5, line = 1.25 * b.style.text;
    b.labels.put({{x, row}, {x, grip.y + 5 + line}, {x, row - line - 2}}, b.length(b.depth),
                 {b.colours.wave, b.style.text, Across::left, Down::bottom, true});
}

void add_boundary_handles(Beam& b) {
    double top = 0.0;
    for (std::size_t i = 0; i + 1 < b.plan.ground.size() && i < 7; ++i) {
        const double thickness = b.plan.ground[i].thickness.likely;
        top += std::max(0.0, thickness);
        const double y = b.cut.at(0, top).y;
        if (y > b.cut.plot.bottom() - grip_radius) break;
        // Thin layers: grips stand side by side instead of on each other.
        const Point grip{b.cut.plot.right() - grip_radius - 5 - (i % 2 == 1 ? 2 * grip_radius + 6 : 0), y};
        b.figure.handles.push_back({"ground." + std::to_string(i) + ".thickness",
                                    material_name(b.plan.ground[i].matter) + ", thickness",
                                    inside(grip, b.cut.plot, grip_radius + 3),
                                    Handle::Way::down,
                                    thickness,
                                    1 / b.cut.scale,
                                    {},
                                    0.01,
                                    false,
                                    0.0});
        b.labels.keep_round(b.figure.handles.back().at, grip_radius + 2);
    }
}

void label_layers(Beam& b) {
    const double size = b.small();
    double top = 0.0;
    for (std::size_t i = 0; i < b.plan.ground.size() && i < 8; ++i) {
        const bool last = i + 1 == b.plan.ground.size();
        const double thickness = std::max(0.0, b.plan.ground[i].thickness.likely), y = b.cut.at(0, top).y + 6;
        if (y > b.cut.plot.bottom()) break;
        const std::string name = material_name(b.plan.ground[i].matter);
        const std::string full = last ? name : name + " " + b.length(thickness);
        const TextStyle right{b.colours.ink, size, Across::right, Down::top},
            left{b.colours.ink, size, Across::left, Down::top};
        const double r = b.cut.plot.right() - 8, l = b.cut.plot.x + 8;
        // Inside its own layer, or not at all.
        if (last || thickness * b.cut.scale > 1.3 * size + 6) {
            if (!b.labels.put({{r, y}, {r, y + 16}}, full, right) && !b.labels.put({{l, y}, {l, y + 20}}, full, left)) {
                b.labels.put({{r, y}, {r, y + 16}}, name, right);
            }
        }
        top += thickness;
    }
}

std::string description_of(const Beam& b) {
    std::string words = target_words(b.plan.target, b.style.units) + ", " + b.length(b.depth) + " deep, under a " +
                        say(b.plan.antenna.pulse.centre_frequency, Quantity::frequency, b.style.units) +
                        " antenna, drawn to scale.";
    if (b.answers.beam.wavelength_at_target > 0)
        words += " The wave is " + b.length(b.answers.beam.wavelength_at_target) + " long there";
    if (b.answers.beam.patch_along > 0)
        words += " and lights a patch " + b.length(2 * b.answers.beam.patch_along) + " wide";
    return words.back() == '.' ? words : words + ".";
}

}  // namespace

Figure beam_figure(Canvas& canvas, const Plan& plan, const Answers& answers, const FigureStyle& style) {
    if (!drawable_box(style.box) || plan.ground.empty()) return {{}, "No ground to draw."};
    Beam b(canvas, plan, answers, style);
    b.cut = make_cut(plan, answers, style);
    const Cut& cut = b.cut;
    if (!(cut.scale > 0)) return {{}, "Nothing to draw."};
    b.begin();
    canvas.push_clip(cut.plot);
    draw_ground(b);
    draw_wave(b);
    draw_targets(b);
    canvas.pop_clip();
    draw_antenna(b);
    add_target_handles(b);
    add_boundary_handles(b);
    draw_wavelength(b);
    draw_patch(b);
    label_depth(b);
    draw_scale_bar(b, {cut.plot.x + 12, cut.plot.bottom() - 12}, std::min(140.0, 0.3 * cut.plot.width), cut.scale);
    const double words_y = cut.at(0, plan.target.depth.likely + plan.target.size).y + 44;
    b.labels.put({{cut.middle + 18, words_y - 22}, {cut.middle, words_y}, {cut.middle + 18, words_y + 4}},
                 target_words(plan.target, style.units), {b.colours.ink, b.small(), Across::left, Down::middle});
    label_layers(b);
    draw_depth_axis(b);
    return b.finish(description_of(b));
}

}  // namespace gg

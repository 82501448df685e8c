#include <algorithm>
#include <array>
#include <cmath>

#include "draw/pair_words.hpp"
#include "draw/parts.hpp"
#include "draw/section_panel.hpp"
#include "draw/textures.hpp"
#include "wave/layers.hpp"

namespace gg {
namespace {

constexpr double shade_height = 10.0;  // css px

double least_of(const std::vector<double>& values) {
    double out = 0.0;
    for (const double v : values) {
        if (std::isfinite(v) && (out == 0.0 || v < out)) out = v;
    }
    return out;
}

struct Pair : Sketch {
    using Sketch::Sketch;
    Box curve, panel, ground;           ///< from the top: strength along the line, travel times, targets to scale
    double from = 0.0, to = 1.0;        ///< m along the line
    double first = 0.0, last = 1.0;     ///< s, of the panel
    double most = 1.0;                  ///< strength that fills the curve's box
    const PairSection* seen = nullptr;  ///< the section, where there is one to show
    Box image{};                        ///< the focused picture beside the panel; no width: not beside it
    bool by_depth = false;              ///< the panel itself shows the focused picture: first and last are m of depth

    double x(double position) const { return panel.x + (position - from) / (to - from) * panel.width; }
    double y(double time) const { return panel.y + (time - first) / (last - first) * panel.height; }
    double scale() const { return panel.width / (to - from); }
    PairWords words() const { return {plan, answers, seen, style.units}; }
    /// Where the panel's own axis has the target's top; 0 where nothing arrives.
    double depth_place() const { return by_depth ? plan.target.depth.likely : least_of(answers.pair.arrival_left); }
    Point depth_grip() const { return inside({panel.x + grip_radius + 4, y(depth_place())}, panel, grip_radius + 2); }
    double middle() const { return answers.pair.first + 0.5 * plan.target.gap; }
    /// The panel, and the picture beside it, in the section's own places along the line.
    SectionFrame frame() const { return frame(panel, first, last); }
    SectionFrame frame(Box box, double top, double bottom) const {
        const std::vector<RoundTarget>& t = seen->scene.targets;
        const double shift = 0.5 * (t[0].x + t[1].x) - middle();
        return {box, from + shift, to + shift, top, bottom};
    }
};

std::vector<Point> strength(const Pair& p, const std::vector<double>& values) {
    std::vector<Point> out;
    const PairPicture& pair = p.answers.pair;
    const std::size_t n = std::min(values.size(), pair.positions.size()), stride = std::max<std::size_t>(1, n / 800);
    for (std::size_t i = 0; i < n; i += stride) {
        if (std::isfinite(values[i]))
            out.push_back(
                {p.x(pair.positions[i]), p.curve.bottom() - std::clamp(values[i] / p.most, 0.0, 1.0) * p.curve.height});
    }
    return out;
}

void draw_strength(Pair& p) {
    const PairPicture& pair = p.answers.pair;
    p.canvas.push_clip({p.curve.x, p.curve.y - 2, p.curve.width, p.curve.height + 4});
    const std::vector<Point> both = strength(p, pair.response);
    for (std::size_t i = 0; i + 1 < both.size(); ++i) {
        p.canvas.area(
            points({both[i], both[i + 1], Point{both[i + 1].x, p.curve.bottom()}, Point{both[i].x, p.curve.bottom()}}),
            p.colours.wave.with_alpha(0.18));
    }
    p.canvas.line(strength(p, pair.alone_left), {p.colours.second, 1.5, 5, 3});
    p.canvas.line(strength(p, pair.alone_right), {p.colours.second, 1.5, 5, 3});
    p.canvas.line(both, {p.colours.wave, 2.4});
    p.canvas.pop_clip();
    p.canvas.line(points({Point{p.curve.x, p.curve.bottom()}, Point{p.curve.right(), p.curve.bottom()}}),
                  {p.colours.hairline, 1});
}

void draw_arrivals(Pair& p, const std::vector<double>& times, const std::vector<double>& alone, double width) {
    const std::vector<double>& at = p.answers.pair.positions;
    const std::size_t n = std::min(at.size(), times.size()), stride = std::max<std::size_t>(1, n / 160);
    for (std::size_t i = 0; i + stride < n; i += stride) {
        const double strong = i < alone.size() && std::isfinite(alone[i]) ? std::clamp(alone[i], 0.0, 1.0) : 0.5;
        const Point a{p.x(at[i]), p.y(times[i])}, b{p.x(at[i + stride]), p.y(times[i + stride])};
        if (!std::isfinite(a.y) || !std::isfinite(b.y)) continue;
        // As tall as the pulse is long, as dark as the echo is strong.
        p.canvas.area(points({Point{a.x, a.y - width / 2}, Point{b.x, b.y - width / 2}, Point{b.x, b.y + width / 2},
                              Point{a.x, a.y + width / 2}}),
                      p.colours.wave.with_alpha(0.05 + 0.4 * strong));
        p.canvas.line(points({a, b}), {p.colours.ink.with_alpha(0.35 + 0.65 * strong), 1.6});
    }
}

/// What a panel shows; the first one says also that something newer is being computed.
void draw_name(Pair& p, const Box& box, const std::string& name, const std::string& details) {
    const TextStyle words{p.colours.ink, p.small(), Across::left, Down::middle};
    // In the corner, or beside the grip where that stands there.
    const Point at{box.x + 8, box.y + p.small()}, beside{p.depth_grip().x + p.beside_grip(), at.y};
    const std::string busy = p.style.computing && box.x == p.panel.x ? ", computing" : "";
    if (!p.labels.put({at, beside}, name + ", " + details + busy, words))
        p.labels.put({at, beside}, name + busy, words);
}

/// Each target where it lies in the focused picture, in whose own two scales it is no circle.
void draw_outlines(Pair& p, const SectionFrame& frame) {
    for (const RoundTarget& target : p.seen->scene.targets) {
        std::array<Point, 33> edge;
        for (std::size_t i = 0; i < edge.size(); ++i) {
            const double angle = 2 * pi * static_cast<double>(i) / (edge.size() - 1);
            edge[i] = {frame.x(target.x + target.radius * std::cos(angle)),
                       frame.y(target.depth + target.radius * std::sin(angle))};
        }
        p.canvas.line(edge, {p.colours.ink.with_alpha(0.7), 1.2, 2, 3});
    }
}

std::string focused_details(const Pair& p) {
    if (p.seen->focused.issue != Issue::none) return "cannot be computed";
    if (p.seen->focused.rows < 2) return "to come";
    return p.seen->focused_before ? "before the change" : gain_words(p.style.look.gain);
}

void draw_image(Pair& p, const SectionFrame& frame) {
    p.canvas.box(frame.box, p.colours.panel, 4);
    p.canvas.push_clip(frame.box);
    draw_focused(p.canvas, frame, *p.seen, p.style.look, p.colours.dark);
    draw_outlines(p, frame);
    p.canvas.pop_clip();
    draw_name(p, frame.box, "Focused", focused_details(p));
}

void draw_section(Pair& p) {
    if (p.by_depth) return draw_image(p, p.frame());
    p.canvas.box(p.panel, p.colours.panel, 4);
    draw_record(p.canvas, p.frame(), *p.seen, p.style.look, p.colours.dark);
    draw_travel_times(p.canvas, p.frame(), *p.seen, p.colours.ink.with_alpha(0.6));
    const double end = p.plan.pass.window;
    if (end > p.first && end < p.last) {
        p.canvas.line(points({Point{p.panel.x, p.y(end)}, Point{p.panel.right(), p.y(end)}}),
                      {p.colours.warn, 1.4, 6, 4});
        p.labels.put({{p.panel.right() - 8, p.y(end) + 0.8 * p.small()}}, "the window ends here",
                     {p.colours.warn, p.small(), Across::right, Down::middle});
    }
    const bool coarse = p.seen->detail == Detail::coarse;
    draw_name(p, p.panel, "Raw", coarse ? "coarse while you drag" : gain_words(p.style.look.gain));
}

/// The inside of the middle panel: the section, or else the travel times of the two neighbours.
void draw_panel(Pair& p) {
    if (p.seen) return draw_section(p);
    const PairPicture& pair = p.answers.pair;
    p.canvas.box(p.panel, p.colours.panel, 4);
    p.canvas.push_clip(p.panel);
    const double width = answer_or(p.answers, "target.width", 0.0) / (p.last - p.first) * p.panel.height;
    draw_arrivals(p, pair.arrival_left, pair.alone_left, std::max(2.0, width));
    draw_arrivals(p, pair.arrival_right, pair.alone_right, std::max(2.0, width));
    p.canvas.pop_clip();
}

/// From a quarter or half of the latest arrival where nothing comes earlier, so that the curves fill the panel; in
/// round numbers, so that it stands still while the depth is dragged a little.
void show_times(Pair& p, double apex) {
    const double width = answer_or(p.answers, "target.width", 0.0);
    double latest = apex;
    for (const double t : {p.answers.pair.arrival_left.empty() ? 0.0 : p.answers.pair.arrival_left.front(),
                           p.answers.pair.arrival_right.empty() ? 0.0 : p.answers.pair.arrival_right.front()}) {
        if (std::isfinite(t)) latest = std::max(latest, t);
    }
    if (p.seen) {
        // Where a hyperbola leaves the panel; early echoes of layers are worth seeing from the start.
        const double away = (p.to - p.answers.pair.first) / p.seen->scene.sampling.step;
        const std::size_t last = p.seen->arrivals.size() - 1;
        latest = p.seen->arrivals[std::min(last, static_cast<std::size_t>(std::max(0.0, away)))];
        latest = std::min(latest, 1.1 * p.plan.pass.window);
    }
    p.last = nice_ceiling(std::max({1.1 * latest, apex + 1.5 * width, 1e-10}) * 1e9) * 1e-9;
    if (p.seen) {
        const double end = p.seen->section.start + p.seen->section.samples * p.seen->section.dt;
        if (end < 0.999 * p.plan.pass.window && p.seen->detail == Detail::full) p.last = std::min(p.last, end);
        if (p.style.look.layers) return;
    }
    for (const double share : {0.5, 0.25}) {
        if (p.first == 0.0 && share * p.last < apex - 1.2 * width) p.first = share * p.last;
    }
}

/// How strong the picture is along the line, as shades: what an office sees of one row of the section.
void draw_shades(Pair& p, Box box) {
    const std::vector<double>& response = p.answers.pair.response;
    const std::size_t n = std::min<std::size_t>(response.size(), 4096);
    if (n < 2) return;
    std::vector<Colour> shades;
    for (std::size_t i = 0; i < n; ++i) {
        const double strong = std::isfinite(response[i]) ? std::clamp(response[i], 0.0, 1.0) : 0.0;
        shades.push_back(p.colours.wave.with_alpha(0.04 + 0.96 * strong));
    }
    p.canvas.image(box, static_cast<int>(n), 1, shades);
}

/// Ticks left of a box, the first of them with the unit's name.
void draw_axis(Pair& p, Box box, double first, double last, double unit, const std::string& name) {
    const TextStyle words{p.colours.soft_ink, p.small(), Across::right, Down::middle};
    bool named = false;
    for (const double t :
         ticks(first / unit, last / unit, std::max(1, static_cast<int>(box.height / (2.4 * p.small()))))) {
        const double y = box.y + (t * unit - first) / (last - first) * box.height;
        p.canvas.line(points({Point{box.x - 4, y}, Point{box.x, y}}), {p.colours.soft_ink, 1});
        named |= p.labels.put({{box.x - 7, y}}, named ? tick_words(t) : tick_words(t) + " " + name, words, false);
    }
}

/// Down to a round depth well below the targets, as far as the image goes once it is there.
double deepest_shown(const Pair& p) {
    const Image& image = p.seen->focused;
    const RoundTarget& target = p.seen->scene.targets[0];
    const double deepest = nice_ceiling(1.5 * target.depth + target.radius);
    return image.rows > 1 ? std::min(deepest, image.rows * image.spacing) : deepest;
}

void draw_axes(Pair& p) {
    const AxisUnit metres = length_axis(p.by_depth ? p.last : p.seen ? deepest_shown(p) : 1.0, p.style.units);
    if (p.by_depth)
        draw_axis(p, p.panel, p.first, p.last, metres.metres, metres.name);
    else
        draw_axis(p, p.panel, p.first, p.last, 1e-9, "ns");
    if (!(p.image.width > 0)) return;
    const SectionFrame frame = p.frame(p.image, 0.0, deepest_shown(p));
    draw_image(p, frame);
    draw_axis(p, frame.box, frame.first, frame.last, metres.metres, metres.name);
}

/// Both targets to scale in a strip of ground under the panel, at the panel's own places along the line.
void draw_ground(Pair& p) {
    const double r = std::clamp(0.5 * p.plan.target.size * p.scale(), 2.0, 0.5 * p.ground.height - 4);
    const double y = p.ground.y + 0.5 * p.ground.height;
    const int layer =
        p.plan.ground.empty() ? 0 : std::clamp(layer_at(likely_stack(p.plan), p.plan.target.depth.likely), 0, 7);
    p.canvas.box(p.ground, p.colours.earth[layer]);
    if (layer < static_cast<int>(p.plan.ground.size())) {
        draw_texture(p.canvas, p.ground, {p.panel.x, p.ground.y},
                     texture_of(p.plan.ground[static_cast<std::size_t>(layer)].matter),
                     p.colours.earth_mark.with_alpha(0.6));
    }
    const double left = p.x(p.answers.pair.first), right = p.x(p.answers.pair.first + p.plan.target.gap);
    for (const double x : {left, right}) {
        p.canvas.line(points({Point{x, p.panel.y}, Point{x, p.ground.bottom()}}),
                      {p.colours.soft_ink.with_alpha(0.5), 1, 3, 4});
        draw_round(p.canvas, p.colours, {x, y}, r, p.plan.target.filling);
        p.labels.keep_round({x, y}, r);
    }
    draw_dimension(p.canvas, {left, y}, {right, y}, {p.colours.wave, 1.6});
    // The pair stands even about its middle: each of the two moves half of what the gap does.
    const Point grip = inside({right + r + grip_radius + 4, y}, p.ground, grip_radius + 2);
    p.figure.handles.push_back({"target.gap",
                                "Gap, centre to centre",
                                grip,
                                Handle::Way::across,
                                p.plan.target.gap,
                                2 / p.scale(),
                                {},
                                0.01,
                                false,
                                0.0});
    p.labels.keep_round(grip, grip_radius + 2);
    const std::string length = p.length(p.plan.target.gap);
    const TextStyle strong{p.colours.wave, p.small(), Across::centre, Down::middle, true};
    for (const std::string& words : {"gap " + length, length}) {
        const double half = 0.5 * p.canvas.measure(words, strong) + 6;
        const double before = p.ground.x + 2 + half, after = grip.x + p.beside_grip() - 6 + half;
        const double aside = after + half < p.ground.right() ? after : before;
        if (p.labels.put({{0.5 * (left + right), y}, {before, y}, {aside, y}}, words, strong)) break;
    }
}

void add_depth_handle(Pair& p) {
    const double place = p.depth_place(), depth = p.plan.target.depth.likely;
    if (!(place > 0)) return;
    const Point grip = p.depth_grip();
    const double per_px = depth / place * (p.last - p.first) / p.panel.height;
    p.canvas.line(points({grip, Point{p.x(p.answers.pair.first), grip.y}}), {p.colours.wave, 1.2, 3, 4});
    p.figure.handles.push_back(
        {"target.depth", "Depth to top", grip, Handle::Way::down, depth, per_px, {}, 0.01, false, 0.0});
    const double x = grip.x + p.beside_grip(), line = 1.25 * p.small();
    p.labels.put({{x, grip.y - 3}, {x, grip.y + 4 + line}, {x, grip.y + 4 + 2 * line}}, p.length(depth) + " deep",
                 {p.colours.wave, p.small(), Across::left, Down::bottom, true});
}

/// Under the picture: how to turn the antenna, and the rules; one line each, where there is room.
void draw_captions(Pair& p, Box box) {
    const TextStyle words{p.colours.soft_ink, p.small(), Across::left, Down::middle};
    const PairWords said = p.words();
    const double line = 1.4 * p.small(), x = box.x + 10, y = box.bottom() - (box.height > 2 * line ? 1.5 : 0.5) * line;
    if (!p.labels.put({{x, y}}, said.turning(), words, false)) p.put_line({x, y}, said.turning_in_brief(), words);
    if (box.height >= 2 * line) p.put_line({x, y + line}, said.rules(), words);
}

/// The verdict large, the sentences beside it: in one row, or in two where the picture is narrow.
void draw_verdict(Pair& p, double height) {
    const TextStyle strong{p.colours.ink, 1.4 * p.style.text, Across::left, Down::middle, true};
    const PairWords said = p.words();
    const std::string verdict(word_for(said.verdict())), first = said.sentence(), second = said.least();
    const double x = p.style.box.x + 10, y = p.style.box.y + 0.5 * height;
    p.canvas.text({x, y}, verdict, strong);
    const double after = x + p.canvas.measure(verdict, strong) + 14;
    const TextStyle row{p.colours.ink, p.style.text, Across::left, Down::middle};
    if (p.labels.put({{after, y}}, first + " " + second, row, false)) return;
    const TextStyle low{p.colours.ink, p.small(), Across::left, Down::middle};
    p.put_line({after, y - 0.62 * p.small()}, first, low);
    if (!p.labels.put({{after, y + 0.64 * p.small()}}, second, low, false))
        p.put_line({after, y + 0.64 * p.small()}, said.least_in_brief(), low);
}

/// From the top: verdict, strength along the line and its shades (without a section), panel, strip of ground, captions
/// (with one). A section's focused picture stands beside the panel where there is room.
void lay_out(Pair& p) {
    const Box& box = p.style.box;
    const PairPicture& pair = p.answers.pair;
    const double gutter = 3.4 * p.style.text, pad = 10, head = 2.5 * p.style.text,
                 strip = std::clamp((p.seen ? 0.12 : 0.16) * box.height, 34.0, 90.0);
    const double line = 1.4 * p.small(), foot = !p.seen ? 0 : box.height > 420 ? 2 * line + 10 : line + 2;
    const double hill = p.seen ? 0 : std::clamp(0.18 * box.height, 30.0, 130.0), shade = p.seen ? 0 : shade_height;
    const bool beside = p.seen && box.width >= 560;
    p.by_depth = p.seen && !beside && p.style.look.focused;
    const double width = beside ? 0.5 * (box.width - pad) - gutter - 4 : box.width - gutter - pad;
    p.curve = {box.x + gutter, box.y + head, width, hill};
    const double top = p.seen ? box.y + head : p.curve.bottom() + shade + 8;
    p.panel = {box.x + gutter, top, width, box.bottom() - foot - strip - 12 - top};
    p.ground = {box.x + gutter, p.panel.bottom() + 6, width, strip};
    if (beside) p.image = {p.panel.right() + 8 + gutter, top, width, p.ground.bottom() - top};
    // A round stretch about the pair's middle, so that the scale stands still while the gap is dragged a little.
    double reach = nice_floor(std::min(p.middle() - pair.positions.front(), pair.positions.back() - p.middle()));
    if (p.seen) {
        // The section's own line, which is a round stretch already.
        const Sampling& s = p.seen->scene.sampling;
        const double shift = 0.5 * (p.seen->scene.targets[0].x + p.seen->scene.targets[1].x);
        reach =
            std::max(std::min(shift - s.first, s.first + (s.traces - 1) * s.step - shift), 0.75 * p.plan.target.gap);
    }
    p.from = p.middle() - reach;
    p.to = p.middle() + reach;
}

}  // namespace

Figure pair_figure(Canvas& canvas, const Plan& plan, const Answers& answers, const FigureStyle& style) {
    const PairPicture& pair = answers.pair;
    if (!drawable_box(style.box)) return {{}, "No room to draw."};
    if (pair.positions.size() < 2 || !(pair.positions.back() > pair.positions.front())) return {{}, "No pair to draw."};
    Pair p(canvas, plan, answers, style);
    if (style.section && style.section->section.ok() && style.section->scene.targets.size() > 1) p.seen = style.section;
    lay_out(p);
    const double apex = std::min(least_of(pair.arrival_left), least_of(pair.arrival_right));
    if (p.by_depth)
        p.last = deepest_shown(p);
    else
        show_times(p, apex);
    for (const auto* curve : {&pair.response, &pair.alone_left, &pair.alone_right}) {
        for (const double v : *curve) {
            if (std::isfinite(v)) p.most = std::max(p.most, 1.04 * v);
        }
    }
    if (!(p.panel.width > 8 && p.panel.height > 8)) return {{}, "No room to draw."};

    p.begin();
    draw_verdict(p, 2.5 * style.text);
    if (!p.seen) {
        draw_strength(p);
        draw_shades(p, {p.curve.x, p.curve.bottom() + 3, p.curve.width, shade_height});
    }
    p.labels.keep_round(p.depth_grip(), grip_radius + 2);
    draw_panel(p);
    draw_ground(p);
    add_depth_handle(p);
    draw_axes(p);
    if (p.seen)
        draw_captions(
            p, {style.box.x, p.ground.bottom() + 4, style.box.width, style.box.bottom() - p.ground.bottom() - 4});
    return p.finish(p.words().description());
}

}  // namespace gg

#include <algorithm>
#include <array>
#include <cmath>

#include "draw/parts.hpp"
#include "draw/textures.hpp"
#include "wave/layers.hpp"

namespace gg {
namespace {

struct Pair {
    Canvas& canvas;
    const Plan& plan;
    const Answers& answers;
    const FigureStyle& style;
    const Palette& colours;
    Labels labels;
    Box curve, panel, ground;        ///< from the top: strength along the line, travel times, targets to scale
    double from = 0.0, to = 1.0;     ///< m along the line
    double first = 0.0, last = 1.0;  ///< s, of the panel
    double most = 1.0;               ///< strength that fills the curve's box
    Figure figure{};

    double x(double position) const { return panel.x + (position - from) / (to - from) * panel.width; }
    double y(double time) const { return panel.y + (time - first) / (last - first) * panel.height; }
    double scale() const { return panel.width / (to - from); }
    double small() const { return 0.85 * style.text; }
};

double least_of(const std::vector<double>& values) {
    double out = 0.0;
    for (const double v : values) {
        if (std::isfinite(v) && (out == 0.0 || v < out)) out = v;
    }
    return out;
}

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

/// The inside of the middle panel: travel times of the two neighbours.
void draw_panel(Pair& p) {
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
    p.last = nice_ceiling(std::max({1.1 * latest, apex + 1.5 * width, 1e-10}) * 1e9) * 1e-9;
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

void draw_time_axis(Pair& p) {
    const double x = p.panel.x;
    const TextStyle words{p.colours.soft_ink, p.small(), Across::right, Down::middle};
    bool named = false;
    for (const double t :
         ticks(p.first * 1e9, p.last * 1e9, std::max(1, static_cast<int>(p.panel.height / (2.4 * p.small()))))) {
        const double y = p.y(t * 1e-9);
        p.canvas.line(points({Point{x - 4, y}, Point{x, y}}), {p.colours.soft_ink, 1});
        named |= p.labels.put({{x - 7, y}}, named ? tick_words(t) : tick_words(t) + " ns", words, false);
    }
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
    const std::string words = "gap " + say(p.plan.target.gap, Quantity::length, p.style.units);
    p.labels.put({{0.5 * (left + right), y}, {p.ground.x + 8 + 4 * p.small(), y}}, words,
                 {p.colours.wave, p.small(), Across::centre, Down::middle, true});
}

void add_depth_handle(Pair& p) {
    const double apex = least_of(p.answers.pair.arrival_left), depth = p.plan.target.depth.likely;
    if (!(apex > 0)) return;
    const Point grip = inside({p.panel.x + grip_radius + 4, p.y(apex)}, p.panel, grip_radius + 2);
    const double per_px = depth / apex * (p.last - p.first) / p.panel.height;
    p.canvas.line(points({grip, Point{p.x(p.answers.pair.first), grip.y}}), {p.colours.wave, 1.2, 3, 4});
    p.figure.handles.push_back(
        {"target.depth", "Depth to top", grip, Handle::Way::down, depth, per_px, {}, 0.01, false, 0.0});
    p.labels.keep_round(grip, grip_radius + 2);
    p.labels.put({{grip.x + grip_radius + 8, grip.y - 3}}, say(depth, Quantity::length, p.style.units) + " deep",
                 {p.colours.wave, p.small(), Across::left, Down::bottom, true});
}

std::string verdict_words(PairPicture::Verdict verdict) {
    switch (verdict) {
        case PairPicture::Verdict::apart:
            return "apart";
        case PairPicture::Verdict::merging:
            return "merging";
        case PairPicture::Verdict::one:
            return "one";
    }
    return {};
}

std::string sentence_of(const Pair& p) {
    const std::string gap = say(p.plan.target.gap, Quantity::length, p.style.units);
    switch (p.answers.pair.verdict) {
        case PairPicture::Verdict::apart:
            return "Two at " + gap + " show as two.";
        case PairPicture::Verdict::merging:
            return "Two at " + gap + " run together.";
        case PairPicture::Verdict::one:
            return "Two at " + gap + " look like one.";
    }
    return {};
}

std::string least_words(const Pair& p) {
    const double least = answer_or(p.answers, "apart.sideways", 0.0);
    return least > 0 ? "They part from " + say(least, Quantity::length, p.style.units) + "." : std::string();
}

/// The verdict large, the sentences beside it: in one row, or in two where the picture is narrow.
void draw_verdict(Pair& p, double height) {
    const TextStyle strong{p.colours.ink, 1.4 * p.style.text, Across::left, Down::middle, true};
    const std::string verdict = verdict_words(p.answers.pair.verdict), first = sentence_of(p), second = least_words(p);
    const double x = p.style.box.x + 10, y = p.style.box.y + 0.5 * height;
    p.canvas.text({x, y}, verdict, strong);
    const double after = x + p.canvas.measure(verdict, strong) + 14;
    const TextStyle row{p.colours.ink, p.style.text, Across::left, Down::middle};
    if (p.labels.put({{after, y}}, first + " " + second, row, false)) return;
    const TextStyle low{p.colours.ink, p.small(), Across::left, Down::middle};
    p.labels.put({{after, y - 0.62 * p.small()}}, first, low, false);
    p.labels.put({{after, y + 0.64 * p.small()}}, second, low, false);
}

}  // namespace

Figure pair_figure(Canvas& canvas, const Plan& plan, const Answers& answers, const FigureStyle& style) {
    const PairPicture& pair = answers.pair;
    if (!drawable_box(style.box)) return {{}, "No room to draw."};
    if (pair.positions.size() < 2 || !(pair.positions.back() > pair.positions.front())) return {{}, "No pair to draw."};
    const Palette& colours = palette(style.dark);
    Pair p{canvas, plan, answers, style, colours, Labels(canvas, colours, style.box), {}, {}, {},
           0.0,    1.0,  0.0,     1.0,   {}};
    const Box& box = style.box;
    const double shade = 10, gutter = 3.4 * style.text, pad = 10, head = 2.5 * style.text;
    const double width = box.width - gutter - pad, strip = std::clamp(0.16 * box.height, 34.0, 90.0),
                 hill = std::clamp(0.18 * box.height, 30.0, 130.0);
    p.curve = {box.x + gutter, box.y + head, width, hill};
    p.panel = {box.x + gutter, p.curve.bottom() + shade + 8, width, box.height - head - hill - strip - shade - 20};
    p.ground = {box.x + gutter, p.panel.bottom() + 6, width, strip};
    // A round stretch about the pair's middle, so that the scale stands still while the gap is dragged a little.
    const double middle = pair.first + 0.5 * plan.target.gap;
    const double reach = nice_floor(std::min(middle - pair.positions.front(), pair.positions.back() - middle));
    p.from = middle - reach;
    p.to = middle + reach;
    const double apex = std::min(least_of(pair.arrival_left), least_of(pair.arrival_right));
    show_times(p, apex);
    for (const auto* curve : {&pair.response, &pair.alone_left, &pair.alone_right}) {
        for (const double v : *curve) {
            if (std::isfinite(v)) p.most = std::max(p.most, 1.04 * v);
        }
    }
    if (!(width > 8 && p.panel.height > 8)) return {{}, "No room to draw."};

    canvas.push_clip(box);
    canvas.box(box, colours.paper);
    draw_verdict(p, head);
    draw_strength(p);
    draw_shades(p, {p.curve.x, p.curve.bottom() + 3, p.curve.width, shade});
    draw_panel(p);
    draw_ground(p);
    add_depth_handle(p);
    draw_time_axis(p);
    p.figure.description = "Two neighbours " + say(plan.target.depth.likely, Quantity::length, style.units) +
                           " deep: " + verdict_words(pair.verdict) + ". " + sentence_of(p) + " " + least_words(p);
    finish_handles(canvas, colours, p.figure, style);
    canvas.pop_clip();
    return p.figure;
}

}  // namespace gg

#include <algorithm>
#include <array>
#include <cmath>

#include "draw/parts.hpp"

namespace gg {
namespace {

/// The site on the screen, north up, one scale.
struct Map {
    Point origin;      ///< css px of site point (0, 0)
    double scale = 1;  ///< css px per m
    Point at(SitePoint s) const { return {origin.x + s.x * scale, origin.y - s.y * scale}; }
};

struct Site : Sketch {
    using Sketch::Sketch;
    Map map;
    Box plot;
};

bool make_map(Site& s) {
    double west = 1e300, east = -1e300, south = 1e300, north = -1e300;
    for (const SitePoint& p : s.plan.lanes.outline) {
        if (!std::isfinite(p.x) || !std::isfinite(p.y)) return false;
        west = std::min(west, p.x), east = std::max(east, p.x), south = std::min(south, p.y),
        north = std::max(north, p.y);
    }
    if (!(east > west && north > south)) return false;
    s.map.scale = std::min(s.plot.width / (east - west), s.plot.height / (north - south));
    s.map.origin = {s.plot.x + 0.5 * s.plot.width - 0.5 * (west + east) * s.map.scale,
                    s.plot.y + 0.5 * s.plot.height + 0.5 * (south + north) * s.map.scale};
    return s.map.scale > 0 && std::isfinite(s.map.scale);
}

void draw_lines(Site& s) {
    const auto& lines = s.answers.lanes.lines;
    // Lines closer than three pixels are one grey: draw every so many.
    const std::size_t every = std::max<std::size_t>(
        {1, lines.size() / 300,
         static_cast<std::size_t>(std::min(1e6, 3.0 / std::max(1e-6, s.plan.lanes.spacing * s.map.scale)))});
    const double fade = std::clamp(s.plan.lanes.spacing * s.map.scale / 14, 0.25, 0.75);
    std::size_t arrows = 0;
    const std::size_t arrow_every =
        std::max<std::size_t>(1, static_cast<std::size_t>(12.0 / std::max(0.1, s.plan.lanes.spacing * s.map.scale)));
    for (std::size_t i = 0; i < lines.size(); i += every) {
        const Point a = s.map.at(lines[i].from), b = s.map.at(lines[i].to);
        const Colour ink = lines[i].second_way ? s.colours.second : s.colours.soft_ink;
        s.canvas.line(points({a, b}), {ink.with_alpha(fade), 1.2});
        if (i % arrow_every != 0 || ++arrows > 120) continue;
        const Point tip{a.x + 0.58 * (b.x - a.x), a.y + 0.58 * (b.y - a.y)};
        draw_arrowhead(s.canvas, tip, {b.x - a.x, b.y - a.y}, 8, ink);
    }
}

/// A stretch of ground along the target, with square ends.
void draw_band(Site& s, Point a, Point b, double width, Colour fill) {
    const double d = std::hypot(b.x - a.x, b.y - a.y);
    if (!(d > 0)) return;
    const double nx = -(b.y - a.y) / d * width / 2, ny = (b.x - a.x) / d * width / 2;
    s.canvas.area(points({{a.x + nx, a.y + ny}, {b.x + nx, b.y + ny}, {b.x - nx, b.y - ny}, {a.x - nx, a.y - ny}}),
                  fill);
}

void draw_target(Site& s) {
    const LanesPicture& lanes = s.answers.lanes;
    const Point a = s.map.at(lanes.target_from), b = s.map.at(lanes.target_to);
    const double width = std::max(6.0, s.plan.target.size * s.map.scale);
    draw_band(s, a, b, width + 6, s.colours.wave.with_alpha(0.3));
    s.canvas.line(points({a, b}), {s.colours.wave, 2});
    for (std::size_t i = 0; i < std::min<std::size_t>(lanes.gaps.size(), 200); ++i) {
        const Point c = s.map.at(lanes.gaps[i].from), d = s.map.at(lanes.gaps[i].to);
        draw_band(s, c, d, width + 8, s.colours.paper);
        s.canvas.line(points({c, d}), {s.colours.warn, 3, 6, 5});
    }
    const std::size_t every = std::max<std::size_t>(1, lanes.hits.size() / 300);
    // Smaller where they stand close, so that each is still one mark.
    const double apart =
        lanes.hits.size() > 1 ? std::hypot(b.x - a.x, b.y - a.y) / static_cast<double>(lanes.hits.size()) : 100.0;
    const double r = std::clamp(0.4 * apart * static_cast<double>(every), 1.6, 5.5);
    for (std::size_t i = 0; i < lanes.hits.size(); i += every) {
        // A filled square on its tip: no other mark here has that form.
        const Point c = s.map.at(lanes.hits[i]);
        s.canvas.area(
            points({Point{c.x, c.y - r - 1.5}, {c.x + r + 1.5, c.y}, {c.x, c.y + r + 1.5}, {c.x - r - 1.5, c.y}}),
            s.colours.paper);
        s.canvas.area(points({Point{c.x, c.y - r}, {c.x + r, c.y}, {c.x, c.y + r}, {c.x - r, c.y}}), s.colours.ink);
    }
}

void add_bearing_handle(Site& s) {
    const LanesPicture& lanes = s.answers.lanes;
    const Point a = s.map.at(lanes.target_from), b = s.map.at(lanes.target_to),
                pivot{0.5 * (a.x + b.x), 0.5 * (a.y + b.y)};
    const double bearing = s.plan.target.bearing, ux = std::sin(bearing), uy = -std::cos(bearing);
    double reach = 0.5 * std::hypot(b.x - a.x, b.y - a.y) - 4;
    // As far out along the target as the picture lets it.
    const Box room{s.style.box.x + 16, s.style.box.y + 16, s.style.box.width - 32, s.style.box.height - 32};
    while (reach > 20 && !room.holds({pivot.x + reach * ux, pivot.y + reach * uy})) reach *= 0.95;
    reach = std::max(reach, 20.0);
    const Point grip{pivot.x + reach * ux, pivot.y + reach * uy};
    s.figure.handles.push_back({"target.bearing", "Bearing of the target", grip, Handle::Way::round, bearing, 0.0,
                                pivot, 3.14159265358979 / 180, false, 3.14159265358979});
    s.labels.keep_round(grip, grip_radius + 2);
}

/// A ruler over a whole number of line spacings, across the lines.
void add_spacing_handle(Site& s) {
    const auto& lines = s.answers.lanes.lines;
    const double spacing = s.plan.lanes.spacing;
    if (lines.empty() || !(spacing > 0)) return;
    double n = 1;
    while (n * spacing * s.map.scale < 40 && n < 1e4) n *= 2;
    const auto size_of = [&](std::size_t i) {
        return s.map.scale * std::hypot(lines[i].to.x - lines[i].from.x, lines[i].to.y - lines[i].from.y);
    };
    // The first line, which stays where it is while the spacing changes, unless a corner of the site cuts it short.
    const std::size_t base = size_of(0) < 60 ? lines.size() / 4 : 0;
    const Point from = s.map.at(lines[base].from), end = s.map.at(lines[base].to);
    const double bearing = s.plan.lanes.bearing;
    double nx = std::cos(bearing), ny = std::sin(bearing);  // right of the direction of travel, on the screen
    if (lines.size() > base + 1) {
        const Point next = s.map.at(lines[base + 1].from);
        if ((next.x - from.x) * nx + (next.y - from.y) * ny < 0) nx = -nx, ny = -ny;
    }
    const double t = 0.24, length = n * spacing * s.map.scale;
    const Point a{from.x + t * (end.x - from.x), from.y + t * (end.y - from.y)};
    const Point b = inside({a.x + nx * length, a.y + ny * length}, s.style.box, grip_radius + 3);
    draw_dimension(s.canvas, a, b, {s.colours.wave, 2});
    const bool across = std::abs(nx) >= std::abs(ny);
    s.figure.handles.push_back({"lanes.spacing",
                                "Line spacing",
                                b,
                                across ? Handle::Way::across : Handle::Way::down,
                                spacing,
                                1 / (n * s.map.scale * (across ? nx : ny)),
                                {},
                                0.01,
                                false,
                                0.0});
    s.labels.keep_round(b, grip_radius + 2);
    const std::string words = (n > 1 ? tick_words(n) + " spacings of " : "spacing ") + s.length(spacing);
    s.labels.put({{b.x + s.beside_grip(), b.y},
                  {0.5 * (a.x + b.x), b.y - grip_radius - 4},
                  {std::min(a.x, b.x), b.y + grip_radius + 4 + 0.7 * s.small()}},
                 words, {s.colours.wave, s.small(), Across::left, Down::middle, true});
}

/// In the upper right corner, above the site.
void draw_north(Site& s) {
    const double r = 0.6 * s.style.text;
    const Point c{s.style.box.right() - r - 10, s.style.box.y + s.small() + r + 4};
    s.canvas.area(points({Point{c.x, c.y - r}, {c.x + 0.6 * r, c.y + 0.8 * r}, {c.x, c.y + 0.4 * r}}), s.colours.ink);
    s.canvas.line(points({Point{c.x, c.y - r}, {c.x - 0.6 * r, c.y + 0.8 * r}, {c.x, c.y + 0.4 * r}}),
                  {s.colours.ink, 1.2}, true);
    s.canvas.text({c.x, c.y - r - 1}, "N", {s.colours.ink, s.small(), Across::centre, Down::bottom, true});
    s.labels.keep({c.x - r - 4, s.style.box.y, 2 * r + 8, c.y + r - s.style.box.y});
}

void draw_legend(Site& s) {
    const double y = s.style.box.bottom() - 10 - 0.5 * s.small();
    const TextStyle words{s.colours.ink, s.small(), Across::left, Down::middle};
    double x = s.style.box.right() - 10;
    if (!s.answers.lanes.gaps.empty()) {
        x -= s.canvas.measure("not seen", words);
        s.canvas.text({x, y}, "not seen", words);
        s.canvas.line(points({{x - 28, y}, {x - 7, y}}), {s.colours.warn, 3, 6, 5});
        x -= 44;
    }
    x -= s.canvas.measure("hit", words);
    s.canvas.text({x, y}, "hit", words);
    s.canvas.area(points({{x - 12, y - 5.5}, {x - 6.5, y}, {x - 12, y + 5.5}, {x - 17.5, y}}), s.colours.ink);
}

std::string count_of(const Site& s) {
    const std::size_t hits = s.answers.lanes.hits.size();
    return std::to_string(s.answers.lanes.lines.size()) + " lines, " + std::to_string(hits) +
           (hits == 1 ? " hit" : " hits");
}

std::string sentence_of(const Site& s) {
    const double between = answer_or(s.answers, "lanes.between_hits", 0.0);
    const bool several = s.answers.lanes.hits.size() > 1 && between > 0;
    return count_of(s) + (several ? ", one every " + s.length(between) : "");
}

}  // namespace

Figure lanes_figure(Canvas& canvas, const Plan& plan, const Answers& answers, const FigureStyle& style) {
    if (!drawable_box(style.box)) return {{}, "No room to draw."};
    const double head = 1.9 * style.text, pad = 22;
    Site s(canvas, plan, answers, style);
    s.plot = {style.box.x + pad, style.box.y + head + 8, style.box.width - 2 * pad,
              style.box.height - head - 3.4 * style.text};
    if (!(s.plot.width > 8 && s.plot.height > 8) || !make_map(s)) return {{}, "No site to draw."};
    s.begin();
    std::vector<Point> outline;
    for (const SitePoint& p : plan.lanes.outline) outline.push_back(s.map.at(p));
    canvas.area(outline, s.colours.panel);
    draw_lines(s);
    canvas.line(outline, {s.colours.ink, 2}, true);
    draw_target(s);
    draw_north(s);
    const Point corner{style.box.x + 10, style.box.y + 0.55 * head};
    const TextStyle strong{s.colours.ink, style.text, Across::left, Down::middle, true};
    const double north = 1.2 * style.text + 15;
    if (!s.put_line(corner, sentence_of(s), strong, north)) s.put_line(corner, count_of(s), strong, north);
    draw_legend(s);
    add_bearing_handle(s);
    add_spacing_handle(s);
    draw_scale_bar(s, {style.box.x + 12, style.box.bottom() - 10}, std::min(140.0, 0.4 * s.plot.width), s.map.scale);
    return s.finish(sentence_of(s) + "; " + s.length(answers.lanes.distance) + " walked, lines " +
                    s.length(plan.lanes.spacing) + " apart.");
}

}  // namespace gg

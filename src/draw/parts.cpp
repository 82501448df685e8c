#include "draw/parts.hpp"

#include <algorithm>
#include <array>
#include <cmath>

namespace gg {

bool Labels::free(Box b) const {
    if (b.x < bounds_.x || b.y < bounds_.y || b.right() > bounds_.right() || b.bottom() > bounds_.bottom())
        return false;
    return std::none_of(taken_.begin(), taken_.end(), [&](const Box& t) {
        return b.x < t.right() && t.x < b.right() && b.y < t.bottom() && t.y < b.bottom();
    });
}

bool Labels::put(std::initializer_list<Point> places, std::string_view words, const TextStyle& style, bool plate) {
    if (words.empty()) return false;
    const double width = canvas_.measure(words, style), height = 1.25 * style.size, pad = 0.25 * style.size;
    for (const Point& p : places) {
        const double x = style.across == Across::left     ? p.x
                         : style.across == Across::centre ? p.x - width / 2
                                                          : p.x - width;
        const double y = style.down == Down::top      ? p.y
                         : style.down == Down::middle ? p.y - height / 2
                         : style.down == Down::bottom ? p.y - height
                                                      : p.y - 0.95 * style.size;
        const Box around{x - pad, y, width + 2 * pad, height};
        if (!free(around)) continue;
        if (plate) canvas_.box(around, colours_.paper.with_alpha(0.82), 0.3 * style.size);
        TextStyle left = style;
        left.across = Across::left;
        left.down = Down::middle;
        canvas_.text({x, y + height / 2}, words, left);
        keep(around);
        return true;
    }
    return false;
}

void draw_grip(Canvas& canvas, const Palette& colours, const Handle& handle, bool held) {
    const Point c = handle.at;
    const double r = held ? grip_radius + 3 : grip_radius;
    if (held) canvas.disc(c, r + 7, colours.wave.with_alpha(0.25));
    canvas.disc(c, r + 2, colours.paper);
    canvas.disc(c, r, colours.wave);
    const double far = 0.62 * r, near = 0.26 * r, half = 0.36 * r;
    const Stroke pen{colours.paper, 2.0};
    const bool round = handle.way == Handle::Way::round;
    double ux = handle.way == Handle::Way::across ? 1 : 0, uy = handle.way == Handle::Way::across ? 0 : 1;
    if (round) {  // along the circle around the pivot
        const double dx = c.x - handle.pivot.x, dy = c.y - handle.pivot.y, d = std::hypot(dx, dy);
        if (d > 0) ux = -dy / d, uy = dx / d;
    }
    for (const double way : {-1.0, 1.0}) {
        const std::array<Point, 3> chevron{Point{c.x + way * near * ux - half * uy, c.y + way * near * uy + half * ux},
                                           Point{c.x + way * far * ux, c.y + way * far * uy},
                                           Point{c.x + way * near * ux + half * uy, c.y + way * near * uy - half * ux}};
        canvas.line(chevron, pen);
    }
}

bool Sketch::put_line(Point at, std::string_view words, TextStyle look, double reserved) {
    const double room = style.box.right() - reserved - at.x - 0.3 * look.size;
    look.size *= std::clamp(room / std::max(1.0, canvas.measure(words, look)), 0.75, 1.0);
    return labels.put({at}, words, look, false);
}

void Sketch::begin() {
    canvas.push_clip(style.box);
    canvas.box(style.box, colours.paper);
}

Figure Sketch::finish(std::string description) {
    std::erase_if(figure.handles, [&](const Handle& h) {
        return !(style.box.holds(h.at) && std::isfinite(h.start) && std::isfinite(h.per_px));
    });
    for (const Handle& handle : figure.handles) {
        if (style.handles) draw_grip(canvas, colours, handle, handle.field == style.held);
    }
    canvas.pop_clip();
    figure.description = std::move(description);
    return std::move(figure);
}

Point inside(Point p, Box box, double margin) {
    const double mx = std::min(margin, box.width / 2), my = std::min(margin, box.height / 2);
    return {std::clamp(p.x, box.x + mx, box.right() - mx), std::clamp(p.y, box.y + my, box.bottom() - my)};
}

double nice_step(double least) {
    if (!(least > 0) || !std::isfinite(least)) return 1.0;
    const double power = std::pow(10.0, std::floor(std::log10(least)));
    for (const double m : {1.0, 2.0, 5.0}) {
        if (m * power >= least * (1 - 1e-9)) return m * power;
    }
    return 10.0 * power;
}

namespace {
constexpr std::array round_numbers{1.0, 1.5, 2.0, 3.0, 4.0, 5.0, 6.0, 8.0, 10.0};
double power_below(double x) { return std::pow(10.0, std::floor(std::log10(x))); }
}  // namespace

double nice_ceiling(double least) {
    if (!(least > 0) || !std::isfinite(least)) return 1.0;
    const double power = power_below(least);
    for (const double m : round_numbers) {
        if (m * power >= least * (1 - 1e-9)) return m * power;
    }
    return 10.0 * power;
}

double nice_floor(double most) {
    if (!(most > 0) || !std::isfinite(most)) return 1.0;
    const double power = power_below(most);
    double out = power;
    for (const double m : round_numbers) {
        if (m * power <= most * (1 + 1e-9)) out = m * power;
    }
    return out;
}

std::vector<double> ticks(double low, double high, int most) {
    std::vector<double> out;
    if (!(high > low) || !std::isfinite(high - low) || most < 1) return out;
    const double step = nice_step((high - low) / most);
    for (double i = std::ceil(low / step - 1e-6); i * step <= high + 1e-6 * step && out.size() < 100; ++i)
        out.push_back(i * step);
    return out;
}

AxisUnit length_axis(double extent, UnitSystem units) {
    if (units == UnitSystem::imperial) return extent < 3 * 0.3048 ? AxisUnit{"in", 0.0254} : AxisUnit{"ft", 0.3048};
    return extent < 0.4 ? AxisUnit{"mm", 0.001} : AxisUnit{"m", 1.0};
}

std::string tick_words(double value) {
    // Six digits are more than any axis of round steps has.
    const std::string words = say_exactly(std::abs(value) < 1e-12 ? 0.0 : value, Quantity::none, UnitSystem::metric);
    return words;
}

void draw_scale_bar(Sketch& s, Point at, double most, double px_per_metre) {
    if (!(px_per_metre > 0) || !(most > 20)) return;
    // The unit of the axis beside it, which is some times as long.
    const AxisUnit unit = length_axis(2.5 * most / px_per_metre, s.style.units);
    const double px = px_per_metre * unit.metres;
    double length = nice_step(most / px);
    while (length * px > most && length > 1e-9) length = nice_step(length / 2.5);
    const double width = length * px;
    const TextStyle words{s.colours.ink, s.small(), Across::left, Down::bottom, false};
    const Box plate{at.x - 5, at.y - 1.25 * words.size - 9, width + 10, 1.25 * words.size + 14};
    if (!s.labels.put({{at.x, at.y - 8}}, tick_words(length) + " " + unit.name, words)) return;
    s.canvas.box({plate.x, at.y - 7, plate.width, 11}, s.colours.paper.with_alpha(0.82), 3);
    s.canvas.box({at.x, at.y - 4, width / 2, 5}, s.colours.ink);
    s.canvas.box({at.x + width / 2, at.y - 4, width / 2, 5}, s.colours.paper);
    const auto edge = points({{at.x, at.y - 4}, {at.x + width, at.y - 4}, {at.x + width, at.y + 1}, {at.x, at.y + 1}});
    s.canvas.line(edge, {s.colours.ink, 1}, true);
    s.labels.keep(plate);
}

void draw_dimension(Canvas& canvas, Point from, Point to, Stroke stroke) {
    const double dx = to.x - from.x, dy = to.y - from.y, d = std::hypot(dx, dy);
    if (!(d > 0)) return;
    const double nx = -dy / d * 5, ny = dx / d * 5;
    canvas.line(points({from, to}), stroke);
    for (const Point& p : {from, to}) {
        canvas.line(points({Point{p.x - nx, p.y - ny}, Point{p.x + nx, p.y + ny}}), {stroke.colour, stroke.width});
    }
}

void draw_arrowhead(Canvas& canvas, Point tip, Point direction, double size, Colour colour) {
    const double d = std::hypot(direction.x, direction.y);
    if (!(d > 0)) return;
    const double ux = direction.x / d * size, uy = direction.y / d * size;
    canvas.area(points({tip, Point{tip.x - ux - 0.5 * uy, tip.y - uy + 0.5 * ux},
                        Point{tip.x - ux + 0.5 * uy, tip.y - uy - 0.5 * ux}}),
                colour);
}

double answer_or(const Answers& answers, std::string_view key, double otherwise) {
    const Answer* found = answers.find(key);
    return found && found->likely.ok() && std::isfinite(found->likely.value) ? found->likely.value : otherwise;
}

void draw_round(Canvas& canvas, const Palette& colours, Point centre, double radius, Filling filling) {
    const double wall = std::max(1.4, 0.13 * radius);
    switch (filling) {
        case Filling::metal:
            canvas.disc(centre, radius, colours.ink);
            return;
        case Filling::plastic_water:
        case Filling::water:
            canvas.disc(centre, radius, colours.wave_soft);
            break;
        case Filling::plastic_air:
        case Filling::air:
            canvas.disc(centre, radius, colours.paper);
            break;
        case Filling::concrete:
            canvas.disc(centre, radius, colours.hairline);
            break;
        case Filling::own:
            canvas.disc(centre, radius, colours.panel);
            break;
    }
    if ((filling == Filling::plastic_water || filling == Filling::water) && radius > 5) {
        for (int row = -1; row <= 1; ++row) {
            const double rise = 0.45 * row, half = 0.62 * radius * std::sqrt(1 - rise * rise);
            std::array<Point, 13> wave;
            for (std::size_t i = 0; i < wave.size(); ++i) {
                const double t = static_cast<double>(i) / 12.0;
                wave[i] = {centre.x + half * (2 * t - 1),
                           centre.y + radius * (rise + 0.08 * std::sin(6.2832 * 1.5 * t))};
            }
            canvas.line(wave, {colours.wave, std::clamp(0.06 * radius, 1.0, 2.0)});
        }
    }
    // Without a wall the ground itself is the edge.
    const bool bare = filling == Filling::air || filling == Filling::water;
    const Stroke edge = bare ? Stroke{colours.ink, 1.6, 4, 3} : Stroke{colours.ink, wall};
    canvas.ring(centre, std::max(0.8, radius - edge.width / 2), edge);
}

std::string material_name(const Matter& matter) {
    const CatalogueRow* row = find_material(matter.material);
    return row ? row->name : "Own numbers";
}

Texture texture_of(const Matter& matter) {
    const CatalogueRow* row = find_material(matter.material);
    return row ? row->texture : Texture::plain;
}

std::string target_words(const Target& target, UnitSystem units) {
    const std::string size = say(target.size, Quantity::small_length, units) + " ";
    if (target.shape == TargetShape::flat) {
        switch (target.filling) {
            case Filling::metal:
                return size + "metal sheet";
            case Filling::plastic_air:
                return size + "plastic layer";
            case Filling::plastic_water:
                return size + "plastic layer, water";
            case Filling::concrete:
                return size + "concrete layer";
            case Filling::air:
                return size + "air gap";
            case Filling::water:
                return size + "water layer";
            case Filling::own:
                return size + "layer";
        }
    }
    const bool round = target.shape == TargetShape::round;
    switch (target.filling) {
        case Filling::metal:
            return size + (round ? "metal bar" : "metal piece");
        case Filling::plastic_air:
            return size + (round ? "plastic pipe, air" : "plastic piece, air");
        case Filling::plastic_water:
            return size + (round ? "plastic pipe, water" : "plastic piece, water");
        case Filling::concrete:
            return size + "concrete";
        case Filling::air:
            return size + "void, air";
        case Filling::water:
            return size + "void, water";
        case Filling::own:
            return size + "target";
    }
    return size + "target";
}

bool drawable_box(Box box) {
    return std::isfinite(box.x) && std::isfinite(box.y) && box.width >= 24 && box.height >= 24 && box.width < 1e5 &&
           box.height < 1e5;
}

}  // namespace gg

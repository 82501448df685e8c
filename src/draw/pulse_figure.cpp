#include <algorithm>
#include <array>
#include <cmath>

#include "draw/parts.hpp"
#include "wave/layers.hpp"

namespace gg {
namespace {

/// A stretch of time on a stretch of screen.
struct Axis {
    double from = 0.0, to = 1.0;  ///< s
    Box box;
    double low = -1.0, high = 1.0;  ///< amplitudes at the bottom and the top
    double x(double time) const { return box.x + (time - from) / (to - from) * box.width; }
    double y(double value) const {
        return box.bottom() - (std::clamp(value, -9.0, 9.0) - low) / (high - low) * box.height;
    }
    double px_per_second() const { return box.width / (to - from); }
};

struct Pulse : Sketch {
    using Sketch::Sketch;
    Axis zoom, all;
};

bool usable(const Signal& s) {
    return s.step > 0 && std::isfinite(s.start) && std::isfinite(s.step) && s.values.size() >= 2;
}

/// Draws at most `most` points of a curve that lies on a signal's grid, within the axis.
std::vector<Point> curve(const Axis& axis, const Signal& grid, const std::vector<double>& values,
                         std::size_t most = 1200) {
    std::vector<Point> out;
    const std::size_t n = std::min(values.size(), grid.values.size());
    const double a = (axis.from - grid.start) / grid.step - 1, z = (axis.to - grid.start) / grid.step + 2;
    const auto first = static_cast<std::size_t>(std::clamp(a, 0.0, static_cast<double>(n)));
    const auto last = static_cast<std::size_t>(std::clamp(z, 0.0, static_cast<double>(n)));
    if (first >= last) return out;
    const std::size_t stride = std::max<std::size_t>(1, (last - first) / most);
    for (std::size_t i = first; i < last; i += stride) {
        // Of each stride its largest swing, so that a short pulse does not vanish between the points drawn.
        std::size_t peak = i;
        for (std::size_t k = i; k < std::min(i + stride, last); ++k) {
            if (std::abs(values[k]) > std::abs(values[peak])) peak = k;
        }
        if (std::isfinite(values[peak])) out.push_back({axis.x(grid.time(peak)), axis.y(values[peak])});
    }
    return out;
}

/// The stretch in which a signal is more than a twentieth of its peak.
struct Stretch {
    double from = 0.0, to = 0.0;
};
Stretch busy(const Signal& s) {
    double peak = 0.0;
    for (const double v : s.values) peak = std::max(peak, std::abs(v));
    std::size_t first = 0, last = s.values.size() - 1;
    if (!(peak > 0)) return {s.start, s.time(last)};
    while (first < last && !(std::abs(s.values[first]) > 0.05 * peak)) ++first;
    while (last > first && !(std::abs(s.values[last]) > 0.05 * peak)) --last;
    return {s.time(first), s.time(last)};
}

/// Lets a signal fill its box but for a share free above and below.
void fit(Axis& axis, const Signal& s, double above, double below) {
    double low = 0.0, high = 0.0;
    for (const double v : s.values) {
        if (std::isfinite(v)) low = std::min(low, v), high = std::max(high, v);
    }
    if (!(high - low > 1e-12)) return;
    const double whole = (high - low) / (1 - above - below);
    axis.high = high + above * whole;
    axis.low = low - below * whole;
}

std::string nanoseconds(double t, UnitSystem units) { return say(t, Quantity::time, units); }

void time_ticks(Pulse& p, const Axis& axis) {
    const double y = axis.box.bottom(), room = 4.2 * p.small();
    for (const double t : ticks(axis.from * 1e9, axis.to * 1e9, std::max(1, static_cast<int>(axis.box.width / room)))) {
        const double x = axis.x(t * 1e-9);
        p.canvas.line(points({Point{x, y}, Point{x, y + 4}}), {p.colours.soft_ink, 1});
        p.labels.put({{x, y + 5}}, tick_words(t), {p.colours.soft_ink, p.small(), Across::centre, Down::top}, false);
    }
}

/// Depth from which an echo comes back at each time: the second axis, on top.
void depth_ticks(Pulse& p, const Axis& axis) {
    const Stack ground = likely_stack(p.plan);
    const double f = p.plan.antenna.pulse.centre_frequency;
    const Value low = depth_after(ground, 0.5 * std::max(0.0, axis.from), f),
                high = depth_after(ground, 0.5 * std::max(0.0, axis.to), f);
    if (!low.ok() || !high.ok()) return;
    const AxisUnit unit = length_axis(high.value, p.style.units);
    const double y = axis.box.y, room = 4.0 * p.small();
    bool named = false;
    for (const double d : ticks(low.value / unit.metres, high.value / unit.metres,
                                std::max(1, static_cast<int>(axis.box.width / room)))) {
        const Value t = time_down(ground, d * unit.metres, f);
        if (!t.ok()) continue;
        const double x = axis.x(2 * t.value);
        p.canvas.line(points({Point{x, y - 4}, Point{x, y}}), {p.colours.soft_ink, 1});
        const std::string words = named ? tick_words(d) : tick_words(d) + " " + unit.name;
        named |=
            p.labels.put({{x, y - 5}}, words, {p.colours.soft_ink, p.small(), Across::centre, Down::bottom}, false);
    }
}

void draw_error(Pulse& p) {
    const Signal& truth = p.answers.pulse.returned;
    const std::vector<Point> a = curve(p.zoom, truth, truth.values, 400),
                             b = curve(p.zoom, truth, p.answers.pulse.joined, 400);
    const std::size_t n = std::min(a.size(), b.size());
    for (std::size_t i = 0; i + 1 < n; ++i) {
        // Each step its own patch: between curves that cross, one polygon would not be simple.
        p.canvas.area(points({a[i], a[i + 1], b[i + 1], b[i]}), p.colours.warn.with_alpha(0.3));
    }
}

void draw_zoom(Pulse& p) {
    const PulsePicture& pulse = p.answers.pulse;
    const Box& box = p.zoom.box;
    p.canvas.box(box, p.colours.panel, 6);
    p.canvas.push_clip(box);
    p.canvas.line(points({Point{box.x, p.zoom.y(0)}, Point{box.right(), p.zoom.y(0)}}), {p.colours.hairline, 1});
    draw_error(p);
    p.canvas.line(curve(p.zoom, pulse.returned, pulse.returned.values), {p.colours.ink, 3.4});
    p.canvas.line(curve(p.zoom, pulse.returned, pulse.joined), {p.colours.second, 1.6, 6, 3});
    p.canvas.line(curve(p.zoom, pulse.returned, pulse.rebuilt), {p.colours.wave, 1.8});
    if (usable(pulse.samples) && p.zoom.px_per_second() * pulse.samples.step > 1.5) {
        for (std::size_t i = 0; i < pulse.samples.values.size(); ++i) {
            const double t = pulse.samples.time(i);
            if (t < p.zoom.from || t > p.zoom.to || !std::isfinite(pulse.samples.values[i])) continue;
            const Point at{p.zoom.x(t), p.zoom.y(pulse.samples.values[i])};
            const double r = std::clamp(0.3 * p.zoom.px_per_second() * pulse.samples.step, 1.6, 4.2);
            p.canvas.disc(at, r + 1.2, p.colours.panel);
            p.canvas.disc(at, r, p.colours.second);
        }
    }
    p.canvas.pop_clip();
}

/// A ruler of a whole number of sampling intervals; its end drags the number of samples.
void draw_interval(Pulse& p) {
    const int samples = std::max(2, p.plan.pass.samples);
    const double interval = p.plan.pass.window / samples, px = interval * p.zoom.px_per_second();
    if (!(px > 1e-6)) return;
    double n = 1;
    while (n * px < 44 && n < 4096) n *= 2;
    const Box& box = p.zoom.box;
    const double x = box.x + 14, y = box.bottom() - grip_radius - 8, end = x + n * px;
    const Point grip = inside({end, y}, box, grip_radius + 4);
    draw_dimension(p.canvas, {x, y}, grip, {p.colours.wave, 1.6});
    if (n <= 16) {
        for (double i = 1; i < n; ++i)
            p.canvas.line(points({Point{x + i * px, y - 3}, Point{x + i * px, y + 3}}), {p.colours.wave, 1.2});
    }
    p.figure.handles.push_back({"pass.samples",
                                "Samples per trace",
                                grip,
                                Handle::Way::across,
                                static_cast<double>(samples),
                                -samples / (n * px),
                                {},
                                1.0,
                                true,
                                0.0});
    p.labels.keep_round(grip, grip_radius + 2);
    const std::string words =
        (n > 1 ? tick_words(n) + " samples, " : "interval ") + nanoseconds(n * interval, p.style.units);
    p.labels.put({{x, y - 10}, {grip.x + p.beside_grip(), y + 0.5 * p.small()}}, words,
                 {p.colours.wave, p.small(), Across::left, Down::bottom, true});
}

/// The whole window, with the stretch shown large marked in it.
void draw_overview(Pulse& p) {
    const PulsePicture& pulse = p.answers.pulse;
    const Box& box = p.all.box;
    const double end = std::min(p.all.x(p.plan.pass.window), box.right());
    p.canvas.box(box, p.colours.panel, 6);
    p.canvas.push_clip(box);
    const double a = p.all.x(p.zoom.from), z = p.all.x(p.zoom.to);
    p.canvas.box({a, box.y, z - a, box.height}, p.colours.wave.with_alpha(0.2));
    for (const double x : {a, z})
        p.canvas.line(points({Point{x, box.y}, Point{x, box.bottom()}}), {p.colours.wave, 1.2});
    p.canvas.line(curve(p.all, pulse.returned, pulse.returned.values, 600), {p.colours.ink, 1.4});
    // What comes after the window's end is not recorded: hatched away.
    p.canvas.box({end, box.y, box.right() - end, box.height}, p.colours.paper.with_alpha(0.75));
    for (double x = end + 6; x < box.right() + box.height; x += 9) {
        const double run = std::min(box.height, x - end);
        p.canvas.line(points({Point{x, box.y}, Point{x - run, box.y + run}}), {p.colours.hairline, 1});
    }
    p.canvas.pop_clip();
    p.canvas.line(points({Point{end, box.y - 4}, Point{end, box.bottom() + 4}}), {p.colours.wave, 2.2});
    const Point grip = inside({end, box.y + box.height / 2}, p.style.box, grip_radius + 3);
    p.figure.handles.push_back({"pass.window",
                                "Time window",
                                grip,
                                Handle::Way::across,
                                p.plan.pass.window,
                                1 / p.all.px_per_second(),
                                {},
                                1e-9,
                                false,
                                0.0});
    p.labels.keep_round(grip, grip_radius + 2);
    // The words leave the pulse free.
    p.labels.keep({a, box.y, z - a, box.height});
    const std::string time = nanoseconds(p.plan.pass.window, p.style.units);
    const std::string depth = pulse.window_depth > 0 ? ", to " + p.length(pulse.window_depth) : "";
    const TextStyle right{p.colours.wave, p.small(), Across::right, Down::middle, true};
    TextStyle left = right;
    left.across = Across::left;
    const double before = grip.x - grip_radius - 9, after = grip.x + grip_radius + 9;
    for (const std::string& words : {"window " + time + depth, time + depth, time}) {
        if (p.labels.put({{before, grip.y}}, words, right) ||
            p.labels.put({{after, grip.y}, {box.x + 6, grip.y}}, words, left))
            break;
    }
}

/// The wavelet as it was sent, small.
void draw_sent(Pulse& p, Box box) {
    const Signal& sent = p.answers.pulse.sent;
    if (!usable(sent) || box.height < 16) return;
    const Stretch part = busy(sent);
    const double half = 0.62 * (part.to - part.from), middle = 0.5 * (part.from + part.to);
    if (!(half > 0)) return;
    Axis axis{middle - half, middle + half, box};
    fit(axis, sent, 0.06, 0.06);
    p.canvas.push_clip(box);
    p.canvas.line(curve(axis, sent, sent.values), {p.colours.soft_ink, 1.8});
    p.canvas.pop_clip();
}

struct Key {
    const char* words;
    Stroke stroke;
};

/// In rows from the left, all of it, with smaller words where there is little room.
void draw_legend(Pulse& p, Box box) {
    const Key keys[] = {{"came back", {p.colours.ink, 3.4}},
                        {"rebuilt", {p.colours.wave, 2}},
                        {"joined dots", {p.colours.second, 1.8, 6, 3}},
                        {"error", {p.colours.warn.with_alpha(0.4), 8}}};
    TextStyle words{p.colours.ink, p.small(), Across::left, Down::middle};
    std::vector<Point> places;
    const auto fits = [&] {
        places.clear();
        const double line = 1.45 * words.size;
        double x = box.x, y = box.y + 0.5 * line;
        for (const Key& key : keys) {
            const double end = x + 24 + p.canvas.measure(key.words, words);
            if (end > box.right() && x > box.x) x = box.x, y += line;
            places.push_back({x, y});
            x += 24 + p.canvas.measure(key.words, words) + 12;
        }
        return y + 0.5 * line <= box.bottom() + 2;
    };
    while (!fits()) {
        words.size *= 0.95;
        if (words.size < 0.6 * p.small()) return;
    }
    for (std::size_t i = 0; i < places.size(); ++i) {
        const Point at = places[i];
        p.canvas.line(points({at, Point{at.x + 18, at.y}}), keys[i].stroke);
        p.canvas.text({at.x + 24, at.y}, keys[i].words, words);
    }
}

std::string description_of(const Pulse& p) {
    const double arrival = answer_or(p.answers, "target.time", 0.0),
                 per_cycle = answer_or(p.answers, "pass.per_cycle", 0.0);
    std::string words = "The pulse as it comes back";
    if (arrival > 0) words += " after " + nanoseconds(arrival, p.style.units);
    words += ", digitised with " + std::to_string(p.plan.pass.samples) + " samples in a window of " +
             nanoseconds(p.plan.pass.window, p.style.units);
    if (per_cycle > 0)
        words += ": " + say(per_cycle, Quantity::ratio, p.style.units) + " samples in its shortest period";
    return words + ".";
}

}  // namespace

Figure pulse_figure(Canvas& canvas, const Plan& plan, const Answers& answers, const FigureStyle& style) {
    const PulsePicture& pulse = answers.pulse;
    if (!drawable_box(style.box)) return {{}, "No room to draw."};
    if (!usable(pulse.returned) || !(plan.pass.window > 0)) return {{}, "No pulse to draw."};
    Pulse p(canvas, plan, answers, style);
    const Box& box = style.box;
    const double small = p.small(), axis = 1.7 * small, pad = 10;
    const double head = std::clamp(0.14 * box.height, 2.9 * small, 110.0),
                 strip = std::clamp(0.17 * box.height, 34.0, 120.0);
    const Box inner{box.x + pad, box.y + 4, box.width - 2 * pad, box.height - 8};

    const Stretch busy_part = busy(pulse.returned);
    const double middle = 0.5 * (busy_part.from + busy_part.to),
                 half = std::max(0.9 * (busy_part.to - busy_part.from), 4 * pulse.returned.step);
    p.zoom.from = middle - half;
    p.zoom.to = middle + half;
    p.zoom.box = {inner.x, inner.y + head + axis, inner.width, inner.height - head - strip - 3 * axis};
    p.all.box = {inner.x, inner.bottom() - axis - strip, inner.width, strip};
    p.all.from = 0.0;
    p.all.to = nice_ceiling(1.12 * std::max(plan.pass.window, busy_part.to));
    if (!(p.zoom.box.height > 8) || !(p.zoom.to > p.zoom.from) || !(p.all.to > 0)) return {{}, "No room to draw."};

    // Below the trace there has to be room for the ruler of samples.
    fit(p.zoom, pulse.returned, 0.1, std::clamp((2 * grip_radius + 16) / p.zoom.box.height, 0.1, 0.5));
    fit(p.all, pulse.returned, 0.1, 0.1);
    p.begin();
    const double sent_width = std::min(0.34 * inner.width, 220.0);
    draw_sent(p, {inner.x, inner.y, sent_width, head});
    canvas.text({inner.x, inner.y}, "sent", {p.colours.soft_ink, small, Across::left, Down::top});
    draw_legend(p, {inner.x + sent_width + 14, inner.y, inner.width - sent_width - 14, head});
    draw_zoom(p);
    draw_interval(p);
    draw_overview(p);
    depth_ticks(p, p.zoom);
    canvas.text({inner.right(), p.zoom.box.bottom() + 5}, "ns", {p.colours.soft_ink, small, Across::right, Down::top});
    p.labels.keep({inner.right() - 2.2 * small, p.zoom.box.bottom() + 2, 2.2 * small, 1.4 * small});
    time_ticks(p, p.zoom);
    canvas.text({inner.right(), p.all.box.bottom() + 5}, "ns", {p.colours.soft_ink, small, Across::right, Down::top});
    p.labels.keep({inner.right() - 2.2 * small, p.all.box.bottom() + 2, 2.2 * small, 1.4 * small});
    time_ticks(p, p.all);
    return p.finish(description_of(p));
}

}  // namespace gg

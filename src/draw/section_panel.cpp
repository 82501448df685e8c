#include "draw/section_panel.hpp"

#include <algorithm>
#include <cmath>
#include <span>

#include "draw/shades.hpp"

namespace gg {
namespace {

constexpr double cell = 2.0;             // css px
constexpr std::size_t most_cells = 600;  // to a side

/// Columns of values, evenly spaced both ways.
struct Columns {
    std::span<const double> values;
    std::span<const double> gain;  ///< of each row of a column; empty: none
    int count = 0, length = 0;
    double first = 0.0, step = 1.0;          ///< m
    double row_first = 0.0, row_step = 1.0;  ///< s or m

    double at(int column, int row) const {
        const auto r = static_cast<std::size_t>(row);
        const double value = values[static_cast<std::size_t>(column) * static_cast<std::size_t>(length) + r];
        return gain.empty() ? value : value * gain[r];
    }
};

/// Strongest value in the frame.
double peak_of(const Columns& c, const SectionFrame& frame) {
    const auto held = [](double place, int count) {
        return static_cast<int>(std::clamp(place, 0.0, static_cast<double>(count)));
    };
    const int left = held(std::ceil((frame.from - c.first) / c.step), c.count),
              right = held(std::floor((frame.to - c.first) / c.step) + 1, c.count);
    const int top = held(std::ceil((frame.first - c.row_first) / c.row_step), c.length),
              bottom = held(std::floor((frame.last - c.row_first) / c.row_step) + 1, c.length);
    double peak = 0.0;
    for (int i = left; i < right; ++i) {
        for (int row = top; row < bottom; ++row) peak = std::max(peak, std::abs(c.at(i, row)));
    }
    return peak;
}

void draw_columns(Canvas& canvas, const SectionFrame& frame, const Columns& c, double peak, Gain gain, bool dark) {
    if (c.count < 1 || c.length < 2 || !(peak > 0.0) || !(c.step > 0.0) || !(c.row_step > 0.0)) return;
    const auto cells = [](double px) {
        return std::min(most_cells, static_cast<std::size_t>(std::max(2.0, std::ceil(px / cell))));
    };
    // Only where there is a record: the picture ends where the line or the window does.
    const double left = std::max(frame.x(c.first - 0.5 * c.step), frame.box.x),
                 right = std::min(frame.x(c.first + (c.count - 0.5) * c.step), frame.box.right()),
                 top = std::max(frame.y(c.row_first), frame.box.y),
                 bottom = std::min(frame.y(c.row_first + (c.length - 1) * c.row_step), frame.box.bottom());
    if (!(right - left > 1 && bottom - top > 1)) return;
    const std::size_t across = cells(right - left), down = cells(bottom - top);
    std::vector<int> column(across);
    for (std::size_t i = 0; i < across; ++i) {
        const double px = left + (static_cast<double>(i) + 0.5) / static_cast<double>(across) * (right - left);
        const double position = frame.from + (px - frame.box.x) / frame.box.width * (frame.to - frame.from);
        column[i] = std::clamp(static_cast<int>(std::lround((position - c.first) / c.step)), 0, c.count - 1);
    }
    std::vector<Colour> pixels(across * down);
    for (std::size_t j = 0; j < down; ++j) {
        const double px = top + (static_cast<double>(j) + 0.5) / static_cast<double>(down) * (bottom - top);
        const double value = frame.first + (px - frame.box.y) / frame.box.height * (frame.last - frame.first);
        const double place = std::clamp((value - c.row_first) / c.row_step, 0.0, c.length - 1.0);
        const int row = std::min(static_cast<int>(place), c.length - 2);
        const double share = place - row;
        for (std::size_t i = 0; i < across; ++i) {
            double v = ((1 - share) * c.at(column[i], row) + share * c.at(column[i], row + 1)) / peak;
            if (gain == Gain::strong) v = std::copysign(std::sqrt(std::abs(v)), v);
            pixels[j * across + i] = shade(v, dark);
        }
    }
    canvas.image({left, top, right - left, bottom - top}, static_cast<int>(across), static_cast<int>(down), pixels);
}

}  // namespace

void draw_record(Canvas& canvas, const SectionFrame& frame, const PairSection& pair, const SectionLook& look,
                 bool dark) {
    const Section& s = pair.section;
    if (!s.ok()) return;
    Columns c{s.targets, {}, s.traces, s.samples, s.first, s.step, s.start, s.dt};
    if (look.gain != Gain::recorded) c.gain = pair.gain;
    const double peak = peak_of(c, frame);
    const std::vector<double> record = record_of(s, {true, look.layers, false, true});
    c.values = record;
    draw_columns(canvas, frame, c, peak, look.gain, dark);
}

void draw_focused(Canvas& canvas, const SectionFrame& frame, const PairSection& pair, const SectionLook& look,
                  bool dark) {
    const Image& image = pair.focused;
    if (image.rows < 2) return;
    Columns c{image.values, {}, image.traces, image.rows, image.first, image.step, 0.0, image.spacing};
    if (look.gain != Gain::recorded) c.gain = pair.focused_gain;
    draw_columns(canvas, frame, c, peak_of(c, frame), look.gain, dark);
}

void draw_travel_times(Canvas& canvas, const SectionFrame& frame, const PairSection& pair, Colour colour) {
    const Sampling& s = pair.scene.sampling;
    if (pair.arrivals.size() < 2) return;
    canvas.push_clip(frame.box);
    for (const RoundTarget& target : pair.scene.targets) {
        std::vector<Point> points;
        const int stride = std::max(1, s.traces / 200);
        for (int i = 0; i < s.traces; i += stride) {
            const double x = s.first + i * s.step, place = std::abs(x - target.x) / s.step;
            const auto at = static_cast<std::size_t>(place);
            if (at + 1 >= pair.arrivals.size()) continue;
            const double share = place - static_cast<double>(at);
            points.push_back({frame.x(x), frame.y((1 - share) * pair.arrivals[at] + share * pair.arrivals[at + 1])});
        }
        canvas.line(points, {colour, 1.2, 2, 5});
    }
    canvas.pop_clip();
}

}  // namespace gg

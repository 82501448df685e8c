#include "echo/apart.hpp"

#include <algorithm>
#include <cmath>
#include <optional>

#include "echo/engine.hpp"
#include "echo/noise.hpp"
#include "wave/fourier.hpp"

namespace gg {
namespace {

constexpr double reading_floor = 0.05;
const double noise_share = 3.0 * std::sqrt(2.0);

struct Span {
    int from, to;  ///< both in it
};

/// The highest places in two spans, one after the other, and the lowest between them; all in units of a place.
Dip dip_of(const std::vector<double>& r, Span one, Span other, double sigma) {
    const int last = static_cast<int>(r.size()) - 1;
    Dip dip;
    one = {std::clamp(one.from, 0, last), std::clamp(one.to, 0, last)};
    other = {std::clamp(other.from, 0, last), std::clamp(other.to, 0, last)};
    if (!(one.from <= one.to && one.to <= other.from && other.from <= other.to)) return dip;
    const auto left = std::max_element(r.begin() + one.from, r.begin() + one.to + 1);
    const auto right = std::max_element(r.begin() + other.from, r.begin() + other.to + 1);
    const double low = *std::min_element(left, right + 1), peak = std::min(*left, *right);
    dip.first = static_cast<double>(left - r.begin());
    dip.second = static_cast<double>(right - r.begin());
    dip.lower_peak = peak;
    if (!(peak > 0.0)) return dip;
    dip.depth = 1.0 - low / peak;
    dip.needed = std::max(reading_floor, noise_share * sigma / peak);
    return dip;
}

double rms(const std::vector<double>& a) {
    double sum = 0.0;
    for (const double x : a) sum += x * x;
    return a.empty() ? 0.0 : std::sqrt(sum / static_cast<double>(a.size()));
}

/// Two-way time to the top of a target straight below the antennas, s, and the pulse's half width about it.
double time_to(const Scene& scene, double depth) {
    const double f = scene.pulse.centre_frequency;
    return 2.0 * ray_to(scene.ground, scene.height, 0.5 * scene.separation, depth, f).time;
}
double pulse_width(const Scene& scene) { return 1.0 / band_of(scene.pulse).width(); }

/// Where in `envelope` the echo expected at `time` peaks: the highest crest close about it, as the neighbour's flank
/// comes soon after. Where there is none, its own flank buries it, and it is read at its time.
int peak_near(const std::vector<double>& envelope, double start, double dt, double time, double width) {
    const int last = static_cast<int>(envelope.size()) - 1;
    const auto place = [&](double t) { return std::clamp(static_cast<int>(std::lround((t - start) / dt)), 0, last); };
    int best = -1;
    for (int i = std::max(1, place(time - 0.5 * width)); i <= std::min(last - 1, place(time + 0.6 * width)); ++i) {
        const bool crest = envelope[i] >= envelope[i - 1] && envelope[i] > envelope[i + 1];
        if (crest && (best < 0 || envelope[i] > envelope[best])) best = i;
    }
    return best >= 0 ? best : place(time);
}

struct Columns {
    int count = 0, length = 0;
    double first = 0.0, step = 0.0;  ///< m along the line
    double start = 0.0, dt = 0.0;    ///< of a column: s or m
    const std::vector<double>* values = nullptr;

    std::vector<double> envelope_of(int column) const {
        return envelope(std::span<const double>(*values).subspan(static_cast<std::size_t>(column) * length,
                                                                 static_cast<std::size_t>(length)));
    }
    int nearest(double x) const { return std::clamp(static_cast<int>(std::lround((x - first) / step)), 0, count - 1); }
};

Dip read(const Columns& c, double x1, double x2, double place1, double place2, double width, double sigma) {
    const double gap = x2 - x1;
    const int row1 = peak_near(c.envelope_of(c.nearest(x1)), c.start, c.dt, place1, width);
    const int row2 = peak_near(c.envelope_of(c.nearest(x2)), c.start, c.dt, place2, width);
    // A quarter of the gap about each place: nearer the middle the two flanks meet and add, a peak that is no target's.
    const Span one{c.nearest(x1 - 0.25 * gap), c.nearest(x1 + 0.25 * gap)},
        other{c.nearest(x2 - 0.25 * gap), c.nearest(x2 + 0.25 * gap)};
    std::vector<double> r(static_cast<std::size_t>(c.count), 0.0);
    for (int i = one.from; i <= other.to; ++i) {
        const std::vector<double> e = c.envelope_of(i);
        r[i] = *std::max_element(e.begin() + std::min(row1, row2), e.begin() + std::max(row1, row2) + 1);
    }
    Dip dip = dip_of(r, one, other, sigma);
    // What stands in the middle counts, not the null beside it: where both flanks meet there and add, they look like
    // one.
    const double middle = 0.5 * (x1 + x2);
    const double between =
        *std::max_element(r.begin() + c.nearest(middle - 0.125 * gap), r.begin() + c.nearest(middle + 0.125 * gap) + 1);
    if (dip.lower_peak > 0.0) dip.depth = std::clamp(1.0 - between / dip.lower_peak, 0.0, dip.depth);
    dip.first = c.first + dip.first * c.step;
    dip.second = c.first + dip.second * c.step;
    return dip;
}

bool stands(const Scene& scene) {
    const Issue issue = materials_issue(scene);
    return fault_of(scene).empty() && (issue == Issue::none || issue == Issue::outside_band);
}

/// What a dip has over what it needs; below 0 it does not part.
double margin(const Dip& dip) { return dip.depth > 0.0 ? dip.depth - dip.needed : -dip.needed; }

/// Smallest value of `size` from which on margin_at(size) >= 0, between low and high, starting from a guess. 3 %.
/// Where even `high` is too small: that, and Issue::no_solution.
template <class F>
Value smallest(double low, double high, double guess, const F& margin_at) {
    constexpr double stride = 1.35, close = 1.03;
    double good = 0.0, bad = 0.0, over = 0.0, under = 0.0;
    for (double at = std::clamp(guess, low, high);;) {
        const double m = margin_at(at);
        if (m >= 0.0) {
            good = at;
            over = m;
            if (!(at > low) || bad > 0.0) break;
            at = std::max(low, at / stride);
        } else {
            bad = at;
            under = m;
            if (good > 0.0) break;
            if (!(at < high)) return {high, Issue::no_solution};
            at = std::min(high, at * stride);
        }
    }
    // Where the straight line between the two ends says, a little to the side of the end that stayed; every third
    // time the middle, whatever the line says.
    bool above = true;
    for (int step = 1; bad > 0.0 && good > close * bad; ++step) {
        double at = std::sqrt(good * bad);
        if (step % 3 != 0) {
            const double line = bad + (good - bad) * under / (under - over), side = 1.0 + 0.45 * (close - 1.0);
            at = std::clamp(above ? line * side : line / side, bad * side, good / side);
        }
        const double m = margin_at(at);
        above = m < 0.0;
        (above ? bad : good) = at;
        (above ? under : over) = m;
    }
    return {good, Issue::none};
}

/// The scene with only what a reading needs: few traces about x, no more time than the echo at `time` and its tail.
Scene close_look(const Scene& scene, double x, double half, double time) {
    Scene look = scene;
    Sampling& s = look.sampling;
    const double dt = s.window / s.samples;
    const int side = static_cast<int>(std::ceil(half / s.step));
    s.first = x - side * s.step;
    s.traces = std::min(2 * side + 1, 4096);
    const double wanted = std::ceil((time + 4.0 * pulse_width(scene) - s.start) / dt);
    s.samples = std::min(s.samples, fast_length(static_cast<int>(std::clamp(wanted, 2.0, 8192.0))));
    s.window = s.samples * dt;
    return look;
}

/// Care enough for a reading: 1 % of the strongest echo, against a dip of 5 %.
constexpr double glance = 0.1;

double sideways_rule(const Scene& scene, double depth) {
    const double v = effective_speed(scene.ground, depth, scene.pulse.centre_frequency).value;
    return std::sqrt(v * depth * pulse_width(scene) / 2.0);
}

/// What is read of a focused image: the tops of both, and on either side what makes up their envelope.
Depths read_at(const Scene& scene) {
    const RoundTarget &a = scene.targets[0], &b = scene.targets[1];
    const double top_a = a.depth - a.radius, top_b = b.depth - b.radius;
    const double v = effective_speed(scene.ground, std::max(a.depth, b.depth), scene.pulse.centre_frequency).value;
    const double margin = 2.0 * v * pulse_width(scene);
    return {std::max(0.0, std::min(top_a, top_b) - margin), std::max(top_a, top_b) + margin};
}

/// Root mean square of noise of `level` in what is read: in the record, or in the focused image before that is made 1.
double noise_of(const Scene& scene, double level, Reading reading) {
    if (reading == Reading::raw || !(level > 0.0)) return level;
    const std::size_t count =
        static_cast<std::size_t>(scene.sampling.traces) * static_cast<std::size_t>(scene.sampling.samples);
    const Image noise = focused(scene, white_noise(count, level, scene.noise.seed), read_at(scene));
    return noise.issue == Issue::none ? rms(noise.values) * noise.peak : 0.0;
}

Dip dip_with(const Scene& scene, const std::vector<double>& record, Reading reading, double sigma) {
    const RoundTarget& a = scene.targets[0].x <= scene.targets[1].x ? scene.targets[0] : scene.targets[1];
    const RoundTarget& b = &a == &scene.targets[0] ? scene.targets[1] : scene.targets[0];
    const double top_a = a.depth - a.radius, top_b = b.depth - b.radius, width = pulse_width(scene);
    const Sampling& s = scene.sampling;
    if (reading == Reading::raw) {
        const Columns c{s.traces, s.samples, s.first, s.step, s.start, s.window / s.samples, &record};
        return read(c, a.x, b.x, time_to(scene, top_a), time_to(scene, top_b), width, sigma);
    }
    const Image image = focused(scene, record, read_at(scene));
    if (image.issue != Issue::none) return {};
    const Columns c{image.traces, image.rows, image.first, image.step, image.top, image.spacing, &image.values};
    const double v = effective_speed(scene.ground, a.depth, scene.pulse.centre_frequency).value;
    return read(c, a.x, b.x, top_a, top_b, 0.5 * v * width, image.peak > 0.0 ? sigma / image.peak : 0.0);
}

/// Two neighbours side by side that are moved apart and together about their midpoint. What does not depend on the gap
/// is kept from one to the next, over gaps down to 1/2.5 of the widest.
class Neighbours {
  public:
    Neighbours(const Scene& pair, Reading reading) : pair_(pair), reading_(reading) {
        pair_.targets.resize(2);
        middle_ = 0.5 * (pair_.targets[0].x + pair_.targets[1].x);
    }
    /// What the dip at a gap has over what it needs; below 0 they are one.
    double margin_at(double gap) {
        if (!(gap <= widest_ && gap >= widest_ / range)) prepare(gap);
        if (look_.sampling.traces < 3) return -1.0;
        place(look_, gap);
        return margin(dip_with(look_, engine_->echoes({look_.targets[0].x, look_.targets[1].x}), reading_, sigma_));
    }

  private:
    static constexpr double range = 2.5;
    void place(Scene& scene, double gap) const {
        scene.targets[0].x = middle_ - 0.5 * gap;
        scene.targets[1].x = middle_ + 0.5 * gap;
    }
    void prepare(double gap) {
        widest_ = gap;
        place(pair_, gap);
        const double depth = std::max(pair_.targets[0].depth, pair_.targets[1].depth);
        const double aperture = reading_ == Reading::raw ? gap : 0.5 * gap + 1.2 * depth;
        const double far = reading_ == Reading::raw ? 1.0 : std::hypot(aperture, depth) / depth;
        look_ = close_look(pair_, middle_, aperture, time_to(pair_, depth) * far);
        engine_.emplace(look_, glance, 0.5 * gap * (1.0 - 1.0 / range));
        if (sigma_ < 0.0) sigma_ = noise_of(look_, noise_level(look_), reading_);
    }

    Scene pair_, look_;
    Reading reading_;
    double middle_ = 0.0, widest_ = 0.0;
    double sigma_ = -1.0;  // hardly changes with the gap
    std::optional<Engine> engine_;
};

/// Trace above the upper target.
int column_above(const Scene& scene, double x) {
    const Sampling& s = scene.sampling;
    return std::clamp(static_cast<int>(std::lround((x - s.first) / s.step)), 0, s.traces - 1);
}

/// @param record  Section::targets
Dip dip_down_with(const Scene& scene, const std::vector<double>& record, double sigma) {
    const RoundTarget* upper = &scene.targets[0];
    const RoundTarget* lower = upper;
    double late = 0.0;
    if (scene.targets.size() > 1) {
        lower = &scene.targets[1];
        if (lower->depth < upper->depth) std::swap(upper, lower);
        late = time_to(scene, lower->depth - lower->radius);
    } else {
        // Through the wall and the filling to the bottom and back.
        const double f = scene.pulse.centre_frequency, wall = upper->wall ? upper->wall->thickness : 0.0;
        late = time_to(scene, upper->depth - upper->radius);
        if (upper->inside.model != Model::metal)
            late += 4.0 * (upper->radius - wall) / plane_wave(upper->inside, f).speed;
        if (upper->wall) late += 2.0 * wall / plane_wave(upper->wall->material, f).speed;
    }
    const Sampling& s = scene.sampling;
    const auto from = record.begin() + static_cast<std::ptrdiff_t>(column_above(scene, upper->x)) * s.samples;
    return dip_down({from, from + s.samples}, s.window / s.samples,
                    time_to(scene, upper->depth - upper->radius) - s.start, late - s.start, sigma);
}

/// What the dip down the trace at x has over what it needs.
double margin_down(const Scene& scene, double x) {
    const Scene look = close_look(scene, x, 0.0, scene.sampling.start + scene.sampling.window);
    if (!fault_of(look).empty()) return -1.0;
    const double sigma = noise_level(look);
    return margin(dip_down_with(look, Engine(look, glance).echoes(), sigma));
}

}  // namespace

Dip dip_sideways(const Scene& scene, const Section& section, Reading reading) {
    if (!section.ok() || scene.targets.size() < 2 || section.traces < 3) return {};
    return dip_with(scene, section.targets, reading, noise_of(scene, rms(section.noise), reading));
}

Dip dip_down(const std::vector<double>& trace, double dt, double early, double late, double sigma) {
    if (trace.size() < 3 || !(dt > 0.0 && early < late)) return {};
    const std::vector<double> e = envelope(trace);
    const double half = 0.5 * (late - early);
    const auto place = [&](double time) {
        return static_cast<int>(std::lround(std::clamp(time / dt, -1.0, static_cast<double>(e.size()))));
    };
    Dip dip = dip_of(e, {place(early - half), place(early + half)}, {place(early + half), place(late + half)}, sigma);
    dip.first *= dt;
    dip.second *= dt;
    return dip;
}

Dip dip_downwards(const Scene& scene, const Section& section) {
    if (!section.ok() || scene.targets.empty()) return {};
    return dip_down_with(scene, section.targets, rms(section.noise));
}

Value smallest_gap(const Scene& scene, Reading reading) {
    if (scene.targets.size() < 2 || !stands(scene)) return {0.0, Issue::out_of_range};
    const RoundTarget &a = scene.targets[0], &b = scene.targets[1];
    const double rule = sideways_rule(scene, std::max(a.depth, b.depth));
    const double drop = a.depth - b.depth, touch = a.radius + b.radius;
    const double low =
        std::max({std::sqrt(std::max(0.0, touch * touch - drop * drop)) * 1.01, 1e-3 * rule, 1.01 * 1e-4});
    Neighbours neighbours(scene, reading);
    return smallest(low, std::max(6.0 * rule, 2.0 * low), (reading == Reading::raw ? 2.0 : 0.5) * rule,
                    [&](double gap) { return neighbours.margin_at(gap); });
}

Value smallest_drop(const Scene& scene) {
    if (scene.targets.size() < 2 || !stands(scene)) return {0.0, Issue::out_of_range};
    Scene pair = scene;
    pair.targets.resize(2);
    if (pair.targets[1].depth < pair.targets[0].depth) std::swap(pair.targets[0], pair.targets[1]);
    RoundTarget &a = pair.targets[0], &b = pair.targets[1];
    b.x = a.x;
    const int layer = layer_at(scene.ground, a.depth);
    const bool last = layer + 1 == static_cast<int>(scene.ground.slabs.size());
    const double v = plane_wave(scene.ground.slabs[layer].material, scene.pulse.centre_frequency).speed,
                 width = pulse_width(scene);
    const double bottom =
        last ? a.depth + 12.0 * v * width : top_of(scene.ground, layer) + scene.ground.slabs[layer].thickness;
    const double low = 1.01 * (a.radius + b.radius), high = bottom - b.radius - a.depth - 1e-6;
    if (!(high > low)) return {0.0, Issue::no_solution};
    const auto margin_at = [&](double drop) {
        b.depth = a.depth + drop;
        return margin_down(pair, a.x);
    };
    return smallest(low, high, a.radius + b.radius + 0.5 * v * width, margin_at);
}

Value smallest_diameter(const Scene& scene) {
    if (scene.targets.empty() || !stands(scene)) return {0.0, Issue::out_of_range};
    Scene one = scene;
    one.targets.resize(1);
    RoundTarget& t = one.targets[0];
    if (t.inside.model == Model::metal) return {0.0, Issue::no_solution};
    const int layer = layer_at(scene.ground, t.depth);
    const bool last = layer + 1 == static_cast<int>(scene.ground.slabs.size());
    const double top = t.depth - t.radius, wall = t.wall ? t.wall->thickness : 0.0;
    const double v = plane_wave(t.inside, scene.pulse.centre_frequency).speed, width = pulse_width(scene);
    const double room = last ? 20.0 : top_of(scene.ground, layer) + scene.ground.slabs[layer].thickness - top - 1e-6;
    const double low = std::max(2.1 * wall, 0.1 * v * width),
                 high = std::min({room, 19.9, 2.0 * wall + 6.0 * v * width});
    if (!(high > low)) return {0.0, Issue::no_solution};
    const auto margin_at = [&](double diameter) {
        t.radius = 0.5 * diameter;
        t.depth = top + t.radius;
        return margin_down(one, t.x);
    };
    return smallest(low, high, 2.0 * wall + 0.5 * v * width, margin_at);
}

}  // namespace gg

#include "survey/section.hpp"

#include <algorithm>
#include <cmath>

#include "echo/media.hpp"
#include "survey/cases.hpp"
#include "survey/parts.hpp"
#include "survey/sane.hpp"
#include "survey/sideways.hpp"
#include "survey/words.hpp"

namespace gg {
namespace {

constexpr int most_traces = 512, coarse_traces = 64, most_exact_traces = 4096;
constexpr double coarse_care = 0.1;   // of the engine's cut-offs: 1 % of the strongest echo, in 60 % of the time
constexpr double coarse_flank = 0.5;  // of the line's far end, to which a coarse record follows the hyperbolas
constexpr double aperture = 1.2;      // of the axis' depth, to either side
constexpr double pipe_wall = 0.05;    // of the diameter
constexpr double most_gain = 1e4;     // 80 dB
constexpr double tail_widths = 3.0;   // of the sent pulse, kept after the last arrival

RoundTarget round_target(const Target& target) {
    RoundTarget out;
    out.radius = 0.5 * target.size;
    out.depth = target.depth.likely + out.radius;
    out.inside = filling_of(target);
    if (target.filling == Filling::plastic_air || target.filling == Filling::plastic_water)
        out.wall = RoundTarget::Wall{pipe_wall * target.size, material_of(matter_of("plastic"))};
    return out;
}

/// Side by side about 0; the two in the middle come first.
std::vector<RoundTarget> targets_of(const Target& target) {
    std::vector<RoundTarget> out;
    if (target.shape == TargetShape::flat) return out;
    const int count = std::clamp(target.count, 1, most_section_targets);
    for (int i = 0; i < count; ++i) {
        RoundTarget t = round_target(target);
        t.x = (i - 0.5 * (count - 1)) * target.gap;
        out.push_back(t);
    }
    const auto middle = std::max(0, count / 2 - 1);
    std::rotate(out.begin(), out.begin() + middle, out.end());
    return out;
}

/// Quarter of the shortest wave that the sent pulse makes anywhere down to the target, m.
double finest_step(const Scene& scene, double depth) {
    const double top = band_of(scene.pulse).high;
    double slowest = speed_of_light;
    for (int i = 0; i <= layer_at(scene.ground, depth); ++i)
        slowest = std::min(slowest, plane_wave(scene.ground.slabs[static_cast<std::size_t>(i)].material, top).speed);
    return 0.25 * slowest / top;
}

void lay_line(Scene& scene, const Target& target, const Pass& pass, Detail detail) {
    Sampling& s = scene.sampling;
    const int count = std::clamp(target.count, 1, most_section_targets);
    const double axis = target.depth.likely + 0.5 * target.size;
    const double half = keyed_up(0.5 * (count - 1) * target.gap + std::max(aperture * axis, 0.75 * target.gap));
    const double wanted = 2.0 * std::floor(half / pass.step + 1e-9) + 1.0;
    double every = 1.0;
    if (detail == Detail::full)
        every = std::min(std::ceil(wanted / most_traces), std::floor(finest_step(scene, axis) / pass.step));
    if (detail == Detail::coarse) every = std::ceil(wanted / coarse_traces);
    every = std::max(1.0, every);
    s.step = every * pass.step;
    const double most = detail == Detail::exact ? most_exact_traces : most_traces;
    const double side = std::min(std::floor(half / s.step + 1e-9), std::floor(0.5 * (most - 1.0)));
    s.traces = 2 * static_cast<int>(side) + 1;
    s.first = -side * s.step;
}

void lay_time(Scene& scene, const Target& target, const Pass& pass, Detail detail) {
    Sampling& s = scene.sampling;
    s.start = 0.0;
    s.window = pass.window;
    s.samples = pass.samples;
    if (detail == Detail::exact) return;
    double farthest = 0.0;
    for (const RoundTarget& t : scene.targets) farthest = std::max(farthest, std::abs(t.x) - s.first);
    if (detail == Detail::coarse) farthest *= coarse_flank;
    const double latest = 2.0 * ray_to(scene.ground, scene.height, farthest + 0.5 * scene.separation,
                                       target.depth.likely, scene.pulse.centre_frequency)
                                    .time +
                          tail_widths / band_of(scene.pulse).width();
    // A round time, so that the picture stands still while something is dragged.
    const double dt = s.window / s.samples, wanted = std::ceil(keyed_up(latest) / dt - 1e-6);
    s.samples = std::clamp(static_cast<int>(std::min(wanted, 1e6)), 2, s.samples);
    s.window = s.samples * dt;
}

Scene scene_of(const Plan& plan, Stack ground, Detail detail, Polarisation polarisation) {
    Scene scene;
    scene.ground = std::move(ground);
    scene.pulse = plan.antenna.pulse;
    scene.separation = plan.antenna.separation;
    scene.height = plan.antenna.height;
    scene.polarisation = polarisation;
    scene.targets = targets_of(plan.target);
    scene.noise.dynamic_range = plan.antenna.dynamic_range;
    scene.noise.stacks = plan.pass.stacks;
    lay_line(scene, plan.target, plan.pass, detail);
    lay_time(scene, plan.target, plan.pass, detail);
    return scene;
}

/// What a sentence calls the target.
std::string_view name_of(const Target& target) {
    switch (target.filling) {
        case Filling::metal:
            return "bar";
        case Filling::plastic_air:
        case Filling::plastic_water:
            return "pipe";
        case Filling::air:
            return "void";
        case Filling::concrete:
        case Filling::water:
        case Filling::own:
            break;
    }
    return "target";
}

}  // namespace

Plan as_pair(Plan plan) {
    plan.target.count = std::max(plan.target.count, 2);
    return plan;
}

Scene scene_for(const Plan& plan, Detail detail, Polarisation polarisation) {
    const Plan sane = make_sane(plan).plan;
    return scene_of(sane, likely_stack(sane), detail, polarisation);
}

std::string section_fault(const Plan& plan) {
    if (plan.target.shape == TargetShape::flat)
        return "The section is computed for round targets; for a flat one the answers downwards hold.";
    return fault_of(scene_for(plan));
}

Section section_for(const Plan& plan, Detail detail, Polarisation polarisation) {
    if (std::string fault = section_fault(plan); !fault.empty()) {
        Section section;
        section.issue = Issue::out_of_range;
        section.reason = std::move(fault);
        return section;
    }
    return section_of(scene_for(plan, detail, polarisation), detail == Detail::coarse ? coarse_care : 1.0);
}

std::vector<double> record_of(const Section& section, SectionParts parts) {
    std::vector<double> out(section.targets.size(), 0.0);
    const auto samples = static_cast<std::size_t>(section.samples);
    for (std::size_t i = 0; i < out.size(); ++i) {
        if (parts.targets) out[i] += section.targets[i];
        if (parts.layers) out[i] += section.layers[i % samples];
        if (parts.direct) out[i] += section.direct[i % samples];
        if (parts.noise) out[i] += section.noise[i];
    }
    return out;
}

std::vector<double> arrivals_at(const Plan& plan, const std::vector<double>& distances) {
    const Sane sane = make_sane(plan);
    const Cases cases = cases_of(sane.plan);
    double reach = 1e-3;
    for (const double x : distances) reach = std::max(reach, std::abs(x));
    const double radius = plan.target.shape == TargetShape::flat ? 0.0 : 0.5 * sane.plan.target.size;
    const EchoCurve curve(cases.likely(), radius, reach);
    std::vector<double> out;
    out.reserve(distances.size());
    for (const double x : distances) out.push_back(curve.apex + curve.later(x));
    return out;
}

std::vector<double> even_gain(const Scene& scene) {
    const Sampling& s = scene.sampling;
    const double f = scene.pulse.centre_frequency;
    std::vector<PlaneWave> waves;
    for (const Slab& slab : scene.ground.slabs) waves.push_back(plane_wave(slab.material, f));
    // Logarithm of what is given back at a depth.
    const auto lost = [&](double depth) {
        double sum = 0.0, top = 0.0;
        for (std::size_t i = 0; i < waves.size() && top < depth; ++i) {
            const bool last = i + 1 == waves.size();
            const double h = last ? depth - top : std::min(scene.ground.slabs[i].thickness, depth - top);
            sum += 2.0 * waves[i].attenuation * h;
            top += h;
        }
        return sum + std::log(std::max(depth + scene.height, 1e-6));
    };
    const double shallow = 0.25 * waves.front().wavelength;  // nearer than that nothing spreads yet
    const double target = scene.targets.empty() ? shallow : scene.targets[0].depth - scene.targets[0].radius;
    const double at_target = lost(std::max(target, shallow)), least = lost(shallow);
    std::vector<double> out(static_cast<std::size_t>(std::max(0, s.samples)), 1.0);
    for (std::size_t i = 0; i < out.size(); ++i) {
        const double time =
            s.start + static_cast<double>(i) * s.window / s.samples - 2.0 * scene.height / speed_of_light;
        const double depth = depth_after(scene.ground, std::max(0.0, 0.5 * time), f).value;
        const double gain = std::min(lost(std::max(depth, shallow)) - least, std::log(most_gain)) + least - at_target;
        out[i] = std::exp(gain);
    }
    return out;
}

Turning turning_for(const Plan& plan) {
    Turning out;
    if (!section_fault(plan).empty()) return out;
    const Scene scene = scene_for(plan);
    const RoundTarget& target = scene.targets.front();
    const auto layer = static_cast<std::size_t>(layer_at(scene.ground, target.depth)) + 1;  // air is 0
    const double top = target.depth - target.radius;
    const Band band = band_of(scene.pulse, 20.0);
    constexpr int lines = 32;
    double along = 0.0, across = 0.0;
    for (int i = 0; i < lines; ++i) {
        const double f = band.low + band.width() * i / (lines - 1.0), w = 2.0 * pi * f;
        const Media media = media_at(scene, w, 1e-3 * w);
        double reached = spectrum_at(scene.pulse, f), depth = 0.0;
        for (std::size_t m = 1; m <= layer; ++m) {
            const double h = m == layer ? top - depth : scene.ground.slabs[m - 1].thickness;
            reached *= std::exp(2.0 * media.ground[m].k.imag() * h);
            depth += h;
        }
        const int order = static_cast<int>(std::abs(media.ground[layer].k) * target.radius) + 6;
        const auto energy = [&](Polarisation polarisation) {
            const std::vector<Complex> s = scatter(media.cylinders[0], media.ground[layer], order, polarisation);
            Complex sum = s[0];
            for (std::size_t n = 1; n < s.size(); ++n) sum += (n % 2 ? -2.0 : 2.0) * s[n];
            return std::norm(reached * sum);
        };
        along += energy(Polarisation::along);
        across += energy(Polarisation::across);
    }
    if (!(along > 0.0 && across > 0.0)) return out;
    out.along_db = 10.0 * std::log10(along / across);
    out.better = out.along_db >= 0.0 ? Polarisation::along : Polarisation::across;
    const std::string name(name_of(plan.target)),
        by = token(0.5 * std::round(2.0 * std::abs(out.along_db)), Quantity::loss);
    if (plan.target.shape == TargetShape::compact)
        out.words = "A compact target has no long side: turn the antenna as it is handiest.";
    else if (std::abs(out.along_db) < 1.0)
        out.words = "Field along or across the " + name + ": both give as strong an echo.";
    else
        out.words = "Turn the antenna's field " + std::string(out.better == Polarisation::along ? "along" : "across") +
                    " the " + name + ": the echo is " + by + " stronger that way.";
    return out;
}

Separation separation_for(const Plan& plan, Polarisation polarisation) {
    PairSection pair = pair_section(plan, Detail::full, polarisation);
    add_separation(pair, plan);
    return *pair.separation;
}

PairSection pair_section(const Plan& given, Detail detail, Polarisation polarisation) {
    const Plan plan = as_pair(given);
    PairSection pair;
    pair.detail = detail;
    pair.scene = scene_for(plan, detail, polarisation);
    pair.section = section_for(plan, detail, polarisation);
    if (!pair.section.ok()) return pair;
    const Sampling& s = pair.scene.sampling;
    std::vector<double> distances;
    for (int i = 0; i <= s.traces; ++i) distances.push_back(i * s.step);
    pair.arrivals = arrivals_at(plan, distances);
    pair.gain = even_gain(pair.scene);
    pair.turning = turning_for(plan);
    return pair;
}

void add_focused(PairSection& pair) {
    if (!pair.section.ok()) return;
    pair.focused = focused(pair.scene, record_of(pair.section, {true, false, false, true}));
    const Sampling& s = pair.scene.sampling;
    const double f = pair.scene.pulse.centre_frequency, last = static_cast<double>(pair.gain.size()) - 1.0;
    pair.focused_gain.clear();
    for (int row = 0; row < pair.focused.rows; ++row) {
        const double time = 2.0 * (time_down(pair.scene.ground, row * pair.focused.spacing, f).value +
                                   pair.scene.height / speed_of_light);
        const double at = std::clamp((time - s.start) * s.samples / s.window, 0.0, last);
        pair.focused_gain.push_back(pair.gain[static_cast<std::size_t>(at)]);
    }
}

void add_separation(PairSection& pair, const Plan& plan) {
    Separation& out = pair.separation.emplace();
    if (!pair.section.ok()) {
        out.least_raw.issue = out.least_focused.issue = pair.section.issue;
        return;
    }
    const Polarisation polarisation = pair.scene.polarisation;
    const bool full = pair.detail == Detail::full;
    const Scene scene = full ? pair.scene : scene_for(as_pair(plan), Detail::full, polarisation);
    const Section section = full ? pair.section : section_of(scene);
    read_separation(scene, section, Reading::raw, out);
    read_separation(scene, section, Reading::focused, out);
}

Dip raw_dip(const Scene& scene) {
    if (scene.targets.size() < 2) return {};
    const RoundTarget &a = scene.targets[0], &b = scene.targets[1];
    const double middle = 0.5 * (a.x + b.x), gap = std::abs(a.x - b.x), f = scene.pulse.centre_frequency;
    Scene look = scene;
    Sampling& s = look.sampling;
    const double most = s.traces - 1.0;
    const double from = std::clamp(std::floor((middle - gap - s.first) / s.step), 0.0, most),
                 to = std::clamp(std::ceil((middle + gap - s.first) / s.step), from, most);
    s.first += from * s.step;
    s.traces = 1 + static_cast<int>(to - from);
    const double tops = std::max(a.depth - a.radius, b.depth - b.radius), dt = s.window / s.samples;
    const double end = 2.0 * ray_to(scene.ground, scene.height, 0.5 * scene.separation, tops, f).time - s.start +
                       (1.0 + tail_widths) / band_of(scene.pulse).width();
    s.samples = static_cast<int>(std::clamp(std::ceil(end / dt), 2.0, std::max(2.0, 1.0 * s.samples)));
    s.window = s.samples * dt;
    return dip_sideways(look, section_of(look, coarse_care), Reading::raw);
}

void add_ranges(Separation& out, const Plan& given, Polarisation polarisation) {
    Plan plan = make_sane(as_pair(given)).plan;
    const Cases cases = cases_of(plan);
    // A ground in which the targets do not fit (a layer too thin for them) is not one of theirs.
    const auto over = [&](const auto& measure) {
        return spread_over(cases, [&](const Case& c) {
            plan.target.depth = exactly(c.depth);
            const Scene scene = scene_of(plan, c.ground->stack, Detail::full, polarisation);
            return fault_of(scene).empty() ? measure(scene) : Value{0.0, Issue::not_a_number};
        });
    };
    out.range_raw = over([](const Scene& scene) { return smallest_gap(scene, Reading::raw); });
    out.range_focused = over([](const Scene& scene) { return smallest_gap(scene, Reading::focused); });
    out.above = over(smallest_drop);
    out.through = over(smallest_diameter);
    out.known = Separation::Known::all;
}

void read_separation(const Scene& scene, const Section& section, Reading reading, Separation& out) {
    (reading == Reading::raw ? out.raw : out.focused) = dip_sideways(scene, section, reading);
    (reading == Reading::raw ? out.least_raw : out.least_focused) = smallest_gap(scene, reading);
}

double section_effort(const Scene& scene) {
    const double f = scene.pulse.centre_frequency;
    double span = scene.sampling.window, orders = 0.0;
    for (const RoundTarget& t : scene.targets) {
        span = std::max(span, 2.0 * time_down(scene.ground, t.depth + t.radius, f).value);
        const int layer = layer_at(scene.ground, t.depth);
        const double k =
            2.0 * pi * f / plane_wave(scene.ground.slabs[static_cast<std::size_t>(layer)].material, f).speed;
        orders += 2.0 * std::min(k * t.radius + 4.0, 30.0) + 1.0;
    }
    return std::max(1.0, std::pow(f * span, 2.0) * (1.0 + std::pow(orders / 60.0, 3.0)));
}

}  // namespace gg

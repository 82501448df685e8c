#include "echo/engine.hpp"

#include <algorithm>
#include <cmath>
#include <optional>

#include "echo/cylinder_functions.hpp"

namespace gg {
namespace {

constexpr double hidden = 5 * faintest;  // the ground takes the highest frequencies first
constexpr double tolerance = 1e-5;       // that evanescent waves are followed to, at the pulse's peak frequency
constexpr double least_share = 1e-4;     // of orders and of rows, of the strongest, at the same

Host host_of(const Scene& scene) {
    const int layer = layer_at(scene.ground, scene.targets[0].depth);
    const bool last = layer + 1 == static_cast<int>(scene.ground.slabs.size());
    return {layer + 1, top_of(scene.ground, layer),
            last ? 0.0 : scene.ground.slabs[static_cast<std::size_t>(layer)].thickness};
}

/// Earliest and latest time of an echo straight from below, s.
struct Arrivals {
    double first = 1e9, last = 0.0;
};
Arrivals arrivals_of(const Scene& scene) {
    const double f = scene.pulse.centre_frequency, air = scene.height / speed_of_light;
    Arrivals out;
    for (const RoundTarget& t : scene.targets) {
        const double top = t.depth - t.radius;
        // The pulse's highest frequencies run ahead.
        const double ahead =
            std::min(time_down(scene.ground, top, f).value, time_down(scene.ground, top, 3.0 * f).value);
        out.first = std::min(out.first, 2.0 * (0.95 * ahead + air));
        out.last = std::max(out.last, 2.0 * (time_down(scene.ground, t.depth + t.radius, f).value + air));
    }
    return out;
}

/// To where the last echo has its tail, even where the window is too short to show it: what comes after that wraps
/// round, and has to be weak. From before anything is sent; where 1 % will do, from shortly before anything arrives,
/// at the price of what wraps round lying over the echoes.
Recording recording_of(const Scene& scene, double care) {
    const Arrivals arrivals = arrivals_of(scene);
    const double onset = onset_of(scene.pulse), quiet = care < 1.0 ? 0.5 * arrivals.first : 0.0;
    return {scene, quiet - onset, arrivals.last + 4.0 * onset, scene.sampling.traces};
}

/// Evanescence in the host, 1/m, from `start` on, at which a wave has lost `fall` Np on its way when it may first gain
/// (kappa a)^n / n! from orders up to n.
/// @param lost  Np, of kappa
template <class Lost>
double evanescent_reach(double start, double radius, int order, double fall, const Lost& lost) {
    for (double kappa = start;; kappa *= 1.15) {
        double gain = 0.0, term = 0.0;
        for (int n = 1; n <= order; ++n) gain = std::max(gain, term += std::log(kappa * radius / n));
        if (lost(kappa) - gain >= fall) return kappa;
    }
}

/// How many orders, from 0, matter: until s_n, times what the nearest image or neighbour makes of it, is below `share`
/// of the largest.
std::size_t orders_that_matter(const std::vector<Complex>& s, Complex k_host, double nearest, double share) {
    const CylinderFunctions f = cylinder_functions(2.0 * k_host * nearest, 2 * static_cast<int>(s.size()) - 2);
    double largest = 0.0;
    std::vector<double> size(s.size());
    for (std::size_t n = 0; n < s.size(); ++n) {
        const double alone = std::abs(s[n]), image = std::abs(f.h[2 * n]);
        size[n] = alone * std::max(1.0, image);
        largest = std::max(largest, n > 1 ? alone : size[n]);
    }
    std::size_t count = s.size();
    while (count > 2 && !(size[count - 1] > share * largest)) --count;
    return count;
}

/// Distance after which sums over kx may repeat themselves. An image's echo takes (its own leg round, plus the true leg
/// back) at least the whole way round at the ground's speed, two image legs twice the way to the nearer one; both then
/// come after the recording's end and are damped. What runs round through the air still has to go down to the target
/// and the true leg up.
double way_round(const Scene& scene, double care, double end, double farthest) {
    double fastest = 0.0;
    for (const double speed : speeds(scene.ground, scene.pulse.centre_frequency)) fastest = std::max(fastest, speed);
    double legs = end;
    for (const RoundTarget& t : scene.targets) {
        const double down = time_down(scene.ground, t.depth - t.radius, scene.pulse.centre_frequency).value;
        legs = std::min(legs, 2.0 * down + scene.height / speed_of_light);
    }
    const double by_air = 0.9 * std::sqrt(std::max(1.0, care)) * speed_of_light * std::max(0.6 * end, end - legs);
    return std::max({fastest * end, 0.5 * fastest * end + farthest, farthest + by_air});
}

Track track_of(const Scene& scene, double care, double end, double spread) {
    const Sampling& s = scene.sampling;
    const double last = s.first + s.step * (s.traces - 1);
    double farthest = 0.0;
    for (const RoundTarget& t : scene.targets)
        farthest = std::max({farthest, std::fabs(t.x - s.first) + spread, std::fabs(t.x - last) + spread});
    return {s.first, s.step, s.traces, scene.separation, way_round(scene, care, end, farthest + scene.separation),
            farthest};
}

bool same_kind(const RoundTarget& a, const RoundTarget& b) {
    return a.radius == b.radius && a.inside == b.inside && a.wall == b.wall;
}

}  // namespace

Engine::Engine(const Scene& scene, double care, double spread)
    : scene_(scene),
      care_(care),
      spread_(spread),
      host_(host_of(scene)),
      recording_(recording_of(scene, care)),
      grids_(track_of(scene, care, recording_.end(), spread)) {
    for (const RoundTarget& t : scene_.targets) {
        const double above = t.depth - host_.top;
        const auto level = std::find(levels_.begin(), levels_.end(), above);
        const auto kind =
            std::find_if(kinds_.begin(), kinds_.end(), [&](const RoundTarget& k) { return same_kind(k, t); });
        x_.push_back(t.x);
        level_of_.push_back(static_cast<std::size_t>(level - levels_.begin()));
        kind_of_.push_back(static_cast<std::size_t>(kind - kinds_.begin()));
        if (level == levels_.end()) levels_.push_back(above);
        if (kind == kinds_.end()) kinds_.push_back(t);
    }
}

double Engine::nearest(std::size_t target, const std::vector<double>& x, double closer) const {
    const RoundTarget& t = scene_.targets[target];
    const double above = levels_[level_of_[target]];
    double out = host_.endless() ? above : std::min(above, host_.thickness - above);
    for (std::size_t p = 0; p < x.size(); ++p) {
        if (p == target) continue;
        const RoundTarget& other = scene_.targets[p];
        const double apart = std::hypot(std::max(0.0, std::fabs(x[target] - x[p]) - closer), t.depth - other.depth);
        out = std::min(out, std::max(apart / (t.radius + other.radius), 1.0) * t.radius);
    }
    return out;
}

Engine::Prepared Engine::prepare(const Tone& tone) {
    const Media media = media_at(scene_, tone.w.real(), recording_.delta());
    const Inner& host = media.ground[host_.layer];
    const double fall = std::max(3.0, std::log(tone.loudness * care_ / tolerance));
    const double share = std::min(0.05, least_share / care_ / tone.loudness);
    const bool along = scene_.polarisation == Polarisation::along;

    std::vector<std::vector<Complex>> s(kinds_.size());
    std::vector<std::size_t> count;
    std::vector<int> order(levels_.size(), 0);  // the largest at each level
    double reach_in = 0.0, reach_between = 0.0, checked = -1.0;
    for (std::size_t q = 0; q < x_.size(); ++q) {
        const RoundTarget& t = scene_.targets[q];
        std::vector<Complex>& answer = s[kind_of_[q]];
        if (answer.empty()) {
            const int most = std::min(30, static_cast<int>(std::abs(host.k) * t.radius) + 14);
            answer = scatter(media.cylinders[q], host, most, scene_.polarisation);
        }
        const double near = nearest(q, x_, 2.0 * spread_);
        const bool again =
            q > 0 && kind_of_[q] == kind_of_[q - 1] && level_of_[q] == level_of_[q - 1] && near == checked;
        checked = near;
        count.push_back(again ? count.back() : orders_that_matter(answer, host.k, near, share));
        if (again) continue;
        const int n = static_cast<int>(count.back()) - 1;
        order[level_of_[q]] = std::max(order[level_of_[q]], n);
        const double above = levels_[level_of_[q]],
                     boundary = host_.endless() ? above : std::min(above, host_.thickness - above);
        // Down to the target: in a layer slower than the host the wave may not be evanescent at all.
        const auto lost_down = [&](double kappa) {
            const double k = host.k.real(), kx2 = k * k + kappa * kappa;
            double lost = kappa * above;
            for (int i = 0; i < host_.layer; ++i) {
                const double own = media.ground[i].k.real();
                lost += std::sqrt(std::max(0.0, kx2 - own * own)) *
                        (i == 0 ? scene_.height : scene_.ground.slabs[static_cast<std::size_t>(i) - 1].thickness);
            }
            return lost;
        };
        reach_in = std::max(reach_in, evanescent_reach(fall / (t.depth + scene_.height), t.radius, n, fall, lost_down));
        reach_between = std::max(reach_between, evanescent_reach(0.5 * fall / boundary, t.radius, n, 0.5 * fall,
                                                                 [&](double kappa) { return kappa * boundary; }));
    }
    const double widest = std::hypot(host.k.real(), reach_in), dk = 2.0 * pi / grids_.track().period;
    const int count_in = static_cast<int>(widest / dk) + 2;
    const int between = static_cast<int>(std::hypot(host.k.real(), reach_between) / dk) + 2;
    const int all = std::max(count_in, between);
    Spectra spectra = spectra_of(media, scene_.ground, host_, scene_.height, scene_.polarisation, dk, all);
    Directions directions(spectra, between);
    const Complex constant =
        along ? -4.0 / (tone.w * vacuum_permeability) : 4.0 / (tone.w * vacuum_permittivity * host.permittivity);
    // What is left of the wave on its way down is taken out, that floats keep their range in lossy ground.
    const double highest = *std::min_element(levels_.begin(), levels_.end());
    double loudness = std::sqrt(norm(spectra.down[0] * travel(spectra.kz[0], highest)));
    if (!(loudness > 0.0)) loudness = 1.0;
    const Grid& grid = grids_.for_waves(widest);
    std::vector<Level> levels;
    std::vector<Table> tables;
    std::vector<Paths> own;
    for (std::size_t i = 0; i < levels_.size(); ++i) {
        levels.push_back(level_at(levels_[i], host_.thickness - levels_[i], host_, spectra, all));
        tables.emplace_back(levels[i], order[i], grid, host_, spectra, count_in, loudness);
        own.emplace_back(levels[i], levels[i], 0.0, 2 * order[i], host_, spectra, directions, between);
    }
    return {tone,    constant, share, std::move(s),      std::move(count),  std::move(spectra), std::move(directions),
            between, loudness, &grid, std::move(levels), std::move(tables), std::move(own)};
}

void Engine::add(const Prepared& p, const std::vector<double>& x) {
    std::vector<Scatterer> targets;
    std::vector<const Paths*> own;
    std::vector<const Table*> tables;
    for (std::size_t q = 0; q < x.size(); ++q) {
        const std::vector<Complex>& s = p.s[kind_of_[q]];
        std::size_t count = p.count[q];
        if (spread_ > 0.0)
            count = std::min(count, orders_that_matter(s, Complex(p.spectra.k), nearest(q, x, 0.0), p.share));
        targets.push_back({x[q], &p.levels[level_of_[q]], {}});
        for (std::size_t n = 0; n < count; ++n) targets[q].strength.push_back(std::sqrt(n == 0 ? s[n] : 2.0 * s[n]));
        own.push_back(&p.own[level_of_[q]]);
        tables.push_back(&p.tables[level_of_[q]]);
    }
    const std::vector<Cx> G = couple(targets, own, host_, p.spectra, p.directions, p.between);
    std::vector<Complex> traces(static_cast<std::size_t>(grids_.track().traces));
    add_echo(*p.grid, grids_.track(), targets, tables, G, p.share, p.constant * (p.loudness * p.loudness),
             traces.data(), 1);
    for (std::size_t i = 0; i < traces.size(); ++i) recording_.add(static_cast<int>(i), p.tone, traces[i]);
}

std::vector<double> Engine::echoes(const std::vector<double>& x) {
    recording_.clear();
    const std::vector<Tone> tones = recording_.tones(hidden / care_);
    for (std::size_t i = 0; i < tones.size(); ++i) {
        if (!(spread_ > 0.0)) {
            add(prepare(tones[i]), x);
            continue;
        }
        if (i == kept_.size()) kept_.push_back(prepare(tones[i]));
        add(kept_[i], x);
    }
    const std::size_t samples = static_cast<std::size_t>(scene_.sampling.samples);
    std::vector<double> out(static_cast<std::size_t>(scene_.sampling.traces) * samples);
    for (int row = 0; row < scene_.sampling.traces; ++row)
        recording_.trace(row, out.data() + static_cast<std::size_t>(row) * samples);
    return out;
}

}  // namespace gg

/// How the section is computed, per frequency w - j delta of a grid that spans one period T:
///   source spectrum through the layers (spectra) -> incident coefficients on a grid of positions (grid) -> joint
///   answer of all targets (coupling) -> echo by reciprocity -> traces; then one inverse transform per trace and
///   exp(+delta t) undone.
/// What sets the accuracy: the small negative imaginary part of the frequency damps what comes after T, which would
/// wrap round to early times, by exp(-delta T); the spacing of kx closes the line on itself after Track::period, from
/// where lateral waves of the images arrive; spectra are cut where the pulse has fallen to `faintest`.
#include <algorithm>
#include <cmath>
#include <string>

#include "echo/cylinder_functions.hpp"
#include "echo/direct.hpp"
#include "echo/grid.hpp"
#include "echo/noise.hpp"
#include "echo/scene.hpp"
#include "echo/transform.hpp"

namespace gg {
namespace {

constexpr double damping = 6.0;     // delta T, Np
constexpr double faintest = 1e-4;   // of the pulse's spectral peak
constexpr double hidden = 5e-4;     // the same for the targets: the ground takes the highest frequencies first
constexpr double tolerance = 1e-4;  // of the strongest part, at the pulse's peak frequency

/// Time grid that holds the wanted samples, starts before anything is sent and has a fast length.
struct Period {
    double start = 0.0, dt = 0.0;
    int size = 0, lead = 0;  ///< samples; those before the first wanted one
    double length() const { return size * dt; }
};

Period period_of(const Scene& scene) {
    const Sampling& s = scene.sampling;
    Period p;
    p.dt = s.window / s.samples;
    // The pulse family's envelope is exp(-(2 pi fp t)^2 / 2n): this long before its peak it has fallen to 1e-8.
    const double onset = std::sqrt(2.0 * order_of(scene.pulse) * 18.4) / (2.0 * pi * scene.pulse.centre_frequency);
    p.lead = std::max(0, static_cast<int>(std::ceil((s.start + onset) / p.dt)));
    p.start = s.start - p.lead * p.dt;
    // What comes after the period wraps round: it has to be the tail of an echo, not the echo itself, even where the
    // window is too short to show it.
    double latest = s.start + s.window;
    for (const RoundTarget& t : scene.targets) {
        const double down = time_down(scene.ground, t.depth + t.radius, scene.pulse.centre_frequency).value;
        latest = std::max(latest, 2.0 * (down + scene.height / speed_of_light) + 4.0 * onset);
    }
    const double wanted = 1.1 * std::ceil((latest - p.start) / p.dt) + 2.0;
    p.size = static_cast<int>(std::min(wanted, 40.0 * (s.samples + p.lead)));
    while ((p.size = fast_length(p.size)) % 2 != 0) ++p.size;
    return p;
}

/// Spectrum of the source current per hertz at a complex frequency, of peak 1 in time. The family's own formula,
/// continued: (f/fp)^n exp(n (1 - (f/fp)^2) / 2), over its integral over f.
Complex source_spectrum(const PulseShape& pulse, Complex w) {
    const double n = order_of(pulse), fp = pulse.centre_frequency;
    const Complex x = w / (2.0 * pi * fp);
    const double peak = fp * std::exp(0.5 * n + 0.5 * (n + 1.0) * std::log(2.0 / n) + std::lgamma(0.5 * (n + 1.0)));
    return std::exp(n * (std::log(x) + 0.5 * (1.0 - x * x))) / peak;
}

Host host_of(const Scene& scene) {
    if (scene.targets.empty()) return {1, 0.0, scene.ground.slabs.size() > 1 ? scene.ground.slabs[0].thickness : 0.0};
    const int layer = layer_at(scene.ground, scene.targets[0].depth);
    const bool last = layer + 1 == static_cast<int>(scene.ground.slabs.size());
    return {layer + 1, top_of(scene.ground, layer),
            last ? 0.0 : scene.ground.slabs[static_cast<std::size_t>(layer)].thickness};
}

/// Distance over which an evanescent wave must fall by `fall` Np when it may first gain (kappa a)^n / n! from orders up
/// to n.
double evanescent_reach(double distance, double radius, int order, double fall) {
    for (double kappa = fall / distance;; kappa *= 1.15) {
        double gain = 0.0, term = 0.0;
        for (int n = 1; n <= order; ++n) gain = std::max(gain, term += std::log(kappa * radius / n));
        if (kappa * distance - gain >= fall) return kappa;
    }
}

/// Orders that matter: until s_n, times what the nearest image or neighbour makes of it, is below `share` of the
/// largest.
std::vector<Complex> matter_of(const Cylinder& cylinder, const Inner& host, double nearest, double share,
                               Polarisation polarisation) {
    const int most = std::min(30, static_cast<int>(std::abs(host.k) * cylinder.radius) + 14);
    std::vector<Complex> s = scatter(cylinder, host, most, polarisation);
    const CylinderFunctions f = cylinder_functions(2.0 * host.k * nearest, 2 * most);
    double largest = 0.0;
    std::vector<double> size(s.size());
    for (std::size_t n = 0; n < s.size(); ++n) {
        size[n] = std::abs(s[n]) * std::max(1.0, std::abs(f.h[2 * n]));
        largest = std::max(largest, std::abs(s[n]) * std::max(1.0, n > 1 ? 0.0 : std::abs(f.h[2 * n])));
    }
    std::size_t count = s.size();
    while (count > 2 && !(size[count - 1] > share * largest)) --count;
    s.resize(count);
    return s;
}

/// Distance after which sums over kx may repeat themselves. An image's echo takes (its own leg round, plus the true leg
/// back) at least the whole way round at the ground's speed, two image legs twice the way to the nearer one; both then
/// come after the period and are damped. What runs round through the air still has to go down to the target and the
/// true leg up.
double way_round(const Scene& scene, double care, double period) {
    double fastest = 0.0;
    for (const double speed : speeds(scene.ground, scene.pulse.centre_frequency)) fastest = std::max(fastest, speed);
    const double first = scene.sampling.first, last = first + scene.sampling.step * (scene.sampling.traces - 1);
    double farthest = 0.0, legs = scene.targets.empty() ? 0.0 : period;
    for (const RoundTarget& t : scene.targets) {
        farthest = std::max({farthest, std::fabs(t.x - first), std::fabs(t.x - last)});
        const double down = time_down(scene.ground, t.depth - t.radius, scene.pulse.centre_frequency).value;
        legs = std::min(legs, 2.0 * down + scene.height / speed_of_light);
    }
    farthest += scene.separation;
    const double by_air = speed_of_light * std::max(0.3 * period, period - legs);
    return std::max({fastest * period, 0.5 * fastest * period + farthest, farthest + std::sqrt(care) * by_air});
}

struct Tone {
    Complex w;
    double loudness;  ///< of the pulse's spectrum here, of its peak
};

class Engine {
  public:
    Engine(const Scene& scene, double care)
        : scene_(scene),
          care_(care),
          period_(period_of(scene)),
          host_(host_of(scene)),
          delta_(damping / period_.length()) {
        const Sampling& s = scene.sampling;
        // The boundaries' own echoes need the way of light in a period: along the surface images are not weak.
        line_ = {s.first, s.step, s.traces, scene.separation,
                 std::max(way_round(scene, care, period_.length()),
                          speed_of_light * period_.length() + 2.0 * scene.separation)};
        for (int i = 0; i < s.samples; ++i)
            gain_.push_back(std::exp(delta_ * (i + period_.lead) * period_.dt) / period_.length());
        bins_ = static_cast<std::size_t>(period_.size) / 2 + 1;
        field_.resize((static_cast<std::size_t>(s.traces) + 2) * bins_);
    }

    void run() {
        const Complex top = source_spectrum(scene_.pulse, 2.0 * pi * scene_.pulse.centre_frequency);
        for (int k = 0;; ++k) {
            const Complex w{2.0 * pi * k / period_.length(), -delta_};
            const double loudness = std::abs(source_spectrum(scene_.pulse, w) / top);
            if (loudness < faintest / care_) {
                if (w.real() > 2.0 * pi * scene_.pulse.centre_frequency) break;
                continue;
            }
            add(k, {w, loudness});
        }
    }

    std::vector<double> trace(std::size_t row) {
        std::vector<double> t(static_cast<std::size_t>(period_.size));
        transform_.sum_real(field_.data() + row * bins_, t.data(), period_.size);
        std::vector<double> out(static_cast<std::size_t>(scene_.sampling.samples));
        for (std::size_t i = 0; i < out.size(); ++i) out[i] = gain_[i] * t[i + static_cast<std::size_t>(period_.lead)];
        return out;
    }
    std::size_t layers_row() const { return static_cast<std::size_t>(scene_.sampling.traces); }
    std::size_t direct_row() const { return layers_row() + 1; }

  private:
    /// Adds a spectral value to a row: frequencies past the sampling's own Nyquist fold back, as they do when recorded.
    void add(int k, const Tone& tone) {
        const Media media = media_at(scene_, tone.w.real(), delta_);
        const double fall = std::max(3.0, std::log(tone.loudness * care_ / tolerance));
        const double k_host = media.ground[host_.layer].k.real();
        const double share = std::min(0.05, tolerance / care_ / tone.loudness);
        const bool along = scene_.polarisation == Polarisation::along;

        std::vector<Scatterer> targets;
        double reach_in = 0.0, reach_between = 0.0;
        const bool heard = tone.loudness > hidden / care_;
        for (std::size_t q = 0; heard && q < scene_.targets.size(); ++q) {
            const RoundTarget& t = scene_.targets[q];
            const double above = t.depth - host_.top, below = host_.endless() ? 0.0 : host_.thickness - above;
            double nearest = host_.endless() ? above : std::min(above, below);
            for (std::size_t p = 0; p < scene_.targets.size(); ++p) {
                const RoundTarget& other = scene_.targets[p];
                if (p != q)
                    nearest = std::min(nearest, std::hypot(t.x - other.x, t.depth - other.depth) * t.radius /
                                                    (t.radius + other.radius));
            }
            Scatterer s{t.x,
                        above,
                        below,
                        matter_of(media.cylinders[q], media.ground[host_.layer], nearest, share, scene_.polarisation),
                        {}};
            for (const Complex& value : s.s) s.root.push_back(std::sqrt(value));
            const double boundary = host_.endless() ? above : std::min(above, below);
            reach_in = std::max(reach_in, evanescent_reach(t.depth + scene_.height, t.radius, s.order(), fall));
            reach_between = std::max(reach_between, evanescent_reach(boundary, t.radius, s.order(), 0.5 * fall));
            targets.push_back(std::move(s));
        }
        const double widest = std::hypot(k_host, reach_in);
        const Grid grid = grid_for(line_, widest);
        const double dk = 2.0 * pi / line_.period;
        const bool layered = scene_.ground.slabs.size() > 1;
        // The boundaries' own echoes: evanescent waves, down to the first of them and back.
        const double reach_echo = 0.5 * fall / (scene_.ground.slabs[0].thickness + scene_.height);
        const int count_echo =
            layered ? static_cast<int>(std::hypot(media.ground[1].k.real(), reach_echo) / dk) + 2 : 0;
        const int count_in = static_cast<int>(widest / dk) + 2;
        const int count_between = static_cast<int>(std::hypot(k_host, reach_between) / dk) + 2;
        const int count_targets = targets.empty() ? 0 : std::max(count_in, count_between);
        const Spectra spectra = spectra_of(media, scene_.ground, host_, scene_.height, scene_.polarisation, dk,
                                           std::max(count_targets, count_echo));
        for (std::size_t q = 0; q < targets.size(); ++q) {
            Scatterer& target = targets[q];
            if (q > 0 && target.above == targets[q - 1].above) {
                target.to_top = targets[q - 1].to_top;
                target.to_bottom = targets[q - 1].to_bottom;
                continue;
            }
            for (std::size_t i = 0; i < static_cast<std::size_t>(count_targets); ++i) {
                target.to_top.push_back(travel(spectra.kz[i], target.above));
                if (!host_.endless()) target.to_bottom.push_back(travel(spectra.kz[i], target.below));
            }
        }
        const Complex source =
            source_spectrum(scene_.pulse, tone.w) * std::exp(Complex{0.0, 1.0} * tone.w * period_.start);
        // Folding: bin k and its mirror image in the half spectrum.
        const int n = period_.size, at = k % n, bin = std::min(at, n - at);
        const bool mirrored = at > n / 2, edge = k > 0 && (bin == 0 || 2 * bin == n);
        const auto put = [&](std::size_t row, Complex value) {
            value *= source;
            field_[row * bins_ + static_cast<std::size_t>(bin)] += edge       ? Complex{2.0 * value.real()}
                                                                   : mirrored ? std::conj(value)
                                                                              : value;
        };
        if (!targets.empty()) {
            const Complex constant =
                along ? -4.0 / (tone.w * vacuum_permeability)
                      : 4.0 / (tone.w * vacuum_permittivity * media.ground[host_.layer].permittivity);
            const std::vector<Complex> joint = joint_answer(targets, host_, spectra, count_between);
            const std::vector<Complex> echo = echo_on(grid, line_, targets, host_, spectra, count_in, joint, share);
            std::vector<Complex> traces(static_cast<std::size_t>(line_.traces));
            onto_traces(grid, line_, echo, constant, traces.data(), 1);
            for (std::size_t i = 0; i < traces.size(); ++i) put(i, traces[i]);
        }
        if (layered) put(layers_row(), layers_echo(media, spectra, count_echo));
        const double nearest = speed_of_light / (20.0 * scene_.pulse.centre_frequency);
        put(direct_row(), direct_wave(media, std::max(scene_.separation, nearest), scene_.height, scene_.polarisation));
    }

    /// Echo of the boundaries below the surface at the receiver, per unit source.
    Complex layers_echo(const Media& media, const Spectra& s, int count) const {
        const bool along = scene_.polarisation == Polarisation::along;
        const double angle = s.spacing * scene_.separation;
        const Cx phase_step{std::cos(angle), std::sin(angle)};
        Cx sum, phase{1.0};
        for (int k = 0; k < count; ++k, phase = phase * phase_step) {
            const std::size_t i = static_cast<std::size_t>(k);
            Cx value = (2.0 * phase.re * (k == 0 ? 0.5 : 1.0)) * s.echo[i];
            if (scene_.height > 0.0) value = value * travel(s.kz_air[i], 2.0 * scene_.height);
            sum += along ? value / s.kz_air[i] : value * s.kz_air[i];
        }
        const Complex constant = along ? -media.w * vacuum_permeability : 1.0 / (media.w * vacuum_permittivity);
        return s.spacing / (4.0 * pi) * constant * Complex(sum);
    }

    const Scene& scene_;
    double care_;
    Period period_;
    Host host_;
    double delta_;
    std::vector<double> gain_;  ///< undoes the damping, sample by sample
    Track line_;
    std::size_t bins_ = 0;
    Transform transform_;
    std::vector<Complex> field_;  ///< rows of half spectra: traces, then layers, then direct
};

Section refused(Issue issue, std::string reason) {
    Section section;
    section.issue = issue;
    section.reason = std::move(reason);
    return section;
}

/// The worst of what the materials say of themselves at the centre frequency.
Issue materials_issue(const Scene& scene) {
    Issue worst = Issue::none;
    const auto ask = [&](const Material& material) {
        if (material.model == Model::metal) return;
        const Issue issue = permittivity(material, scene.pulse.centre_frequency).issue;
        if (worst == Issue::none || (worst == Issue::outside_band && issue != Issue::none)) worst = issue;
    };
    for (const Slab& slab : scene.ground.slabs) ask(slab.material);
    for (const RoundTarget& target : scene.targets) {
        ask(target.inside);
        if (target.wall) ask(target.wall->material);
    }
    return worst;
}

}  // namespace

Section section_of(const Scene& scene, double care) {
    if (std::string fault = fault_of(scene); !fault.empty()) return refused(Issue::out_of_range, std::move(fault));
    const Issue issue = materials_issue(scene);
    if (issue != Issue::none && issue != Issue::outside_band) return refused(issue, std::string(sentence(issue)));
    Engine engine(scene, care);
    engine.run();
    const Sampling& s = scene.sampling;
    Section section;
    section.traces = s.traces;
    section.samples = s.samples;
    section.first = s.first;
    section.step = s.step;
    section.start = s.start;
    section.dt = s.window / s.samples;
    section.issue = issue;
    section.targets.reserve(static_cast<std::size_t>(s.traces) * static_cast<std::size_t>(s.samples));
    for (std::size_t row = 0; row < static_cast<std::size_t>(s.traces); ++row) {
        const std::vector<double> trace = engine.trace(row);
        section.targets.insert(section.targets.end(), trace.begin(), trace.end());
    }
    section.layers = engine.trace(engine.layers_row());
    section.direct = engine.trace(engine.direct_row());
    double peak = 0.0;
    for (const double value : section.direct) peak = std::max(peak, std::fabs(value));
    const double rms = peak * std::pow(10.0, -scene.noise.dynamic_range / 20.0) / std::sqrt(scene.noise.stacks);
    section.noise = white_noise(section.targets.size(), rms, scene.noise.seed);
    return section;
}

}  // namespace gg

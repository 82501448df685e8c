#include "echo/focus.hpp"

#include <algorithm>
#include <cmath>

#include "echo/fast_complex.hpp"
#include "echo/lanes.hpp"
#include "echo/transform.hpp"

namespace gg {
namespace {

/// Separation over the mean speed down to where each sample's time leads, s.
std::vector<double> delays_of(const Scene& scene) {
    const Sampling& s = scene.sampling;
    std::vector<double> delays(static_cast<std::size_t>(s.samples), 0.0);
    if (!(scene.separation > 0.0)) return delays;
    for (int i = 0; i < s.samples; ++i) {
        const double time = std::max(0.0, s.start + i * s.window / s.samples);
        const double depth = depth_after(scene.ground, 0.5 * time, scene.pulse.centre_frequency).value;
        delays[i] = depth > 0.0 ? scene.separation * 0.5 * time / depth : 0.0;
    }
    return delays;
}

/// Makes traces as if transmitter and receiver stood together, at the same sample times; four-point Lagrange between
/// samples.
class CloseUp {
  public:
    explicit CloseUp(const Scene& scene) {
        const Sampling& s = scene.sampling;
        const std::vector<double> delays = delays_of(scene);
        const double dt = s.window / s.samples;
        padded_.resize(static_cast<std::size_t>(s.samples) + 2 * edge);
        for (int i = 0; i < s.samples; ++i) {
            const double time = s.start + i * dt, later = std::hypot(time, delays[static_cast<std::size_t>(i)]);
            const double at = (later - s.start) / dt, left = std::floor(at), u = at - left;
            if (!(time > 0.0) || left > s.samples + 1.0) {
                samples_.push_back({0, {}});
                continue;
            }
            samples_.push_back({static_cast<std::size_t>(left + edge - 1.0),
                                {-u * (u - 1) * (u - 2) / 6, (u + 1) * (u - 1) * (u - 2) / 2,
                                 -(u + 1) * u * (u - 2) / 2, (u + 1) * u * (u - 1) / 6}});
        }
    }
    void operator()(const double* trace, double* out) {
        std::copy_n(trace, samples_.size(), padded_.begin() + edge);
        for (std::size_t i = 0; i < samples_.size(); ++i) {
            const double *from = &padded_[samples_[i].from], *weight = samples_[i].weight;
            out[i] = weight[0] * from[0] + weight[1] * from[1] + weight[2] * from[2] + weight[3] * from[3];
        }
    }

  private:
    static constexpr int edge = 4;
    struct Sample {
        std::size_t from;
        double weight[4];
    };
    std::vector<Sample> samples_;
    std::vector<double> padded_;
};

/// The record's waves at the surface, one per frequency and kx, in rows of one frequency each: kx runs from -reach to
/// reach turns of the line's length, as far as the slowest layer carries that frequency.
struct Waves {
    struct Frequency {
        double w;   ///< rad/s
        int reach;  ///< of kx
        int at;     ///< of -reach in the arrays
    };
    int turns = 0;    ///< the largest reach
    double dk = 0.0;  ///< 1/m
    std::vector<Frequency> frequencies;
    std::vector<float> re, im;            ///< values
    std::vector<float> step_re, step_im;  ///< what they turn by from row to row

    int add(double w, int reach) {
        frequencies.push_back({w, reach, static_cast<int>(re.size())});
        turns = std::max(turns, reach);
        const std::size_t size = re.size() + static_cast<std::size_t>(in_lanes(2 * reach + 1));
        for (auto* list : {&re, &im, &step_re, &step_im}) list->resize(size);
        return frequencies.back().at;
    }
    /// exp(j kz way) at twice the way's time in ground of speed v; 0 where nothing travels.
    Cx phase(const Frequency& f, int turn_count, double v, double way) const {
        const double kx = turn_count * dk, kz2 = 4.0 * f.w * f.w / (v * v) - kx * kx;
        if (!(kz2 > 0.0)) return {};
        const double angle = std::sqrt(kz2) * way;
        return {std::cos(angle), std::sin(angle)};
    }
    template <class F>
    void for_each(const F& f) {
        for (const Frequency& one : frequencies) {
            for (int turn_count = 0; turn_count <= one.reach; ++turn_count) f(one, turn_count);
        }
    }
    /// Takes every wave down by `way`, m.
    void sink(double v, double way) {
        for_each([&](const Frequency& f, int turn_count) {
            const Cx by = phase(f, turn_count, v, way);
            for (const int side : {-1, 1}) {
                if (turn_count == 0 && side < 0) continue;
                const std::size_t i = static_cast<std::size_t>(f.at + f.reach + side * turn_count);
                const Cx value = Cx{re[i], im[i]} * by;
                re[i] = static_cast<float>(value.re);
                im[i] = static_cast<float>(value.im);
            }
        });
    }
    void set_step(double v, double way) {
        for_each([&](const Frequency& f, int turn_count) {
            const Cx by = phase(f, turn_count, v, way);
            for (const int side : {-1, 1}) {
                const std::size_t i = static_cast<std::size_t>(f.at + f.reach + side * turn_count);
                step_re[i] = static_cast<float>(by.re);
                step_im[i] = static_cast<float>(by.im);
            }
        });
    }
    /// One step down for all; all frequencies' sum for each kx, from -turns.
    void step(std::vector<float>& sum_re, std::vector<float>& sum_im) {
        std::fill(sum_re.begin(), sum_re.end(), 0.0F);
        std::fill(sum_im.begin(), sum_im.end(), 0.0F);
        for (const Frequency& f : frequencies) {
            const int from = turns - f.reach;
            for (int i = 0; i < 2 * f.reach + 1; i += lanes) {
                const std::size_t at = static_cast<std::size_t>(f.at + i), to = static_cast<std::size_t>(from + i);
                const Eight a_re = Eight::load(&re[at]), a_im = Eight::load(&im[at]), by_re = Eight::load(&step_re[at]),
                            by_im = Eight::load(&step_im[at]);
                const Eight new_re = a_re * by_re - a_im * by_im, new_im = a_re * by_im + a_im * by_re;
                new_re.store(&re[at]);
                new_im.store(&im[at]);
                (Eight::load(&sum_re[to]) + new_re).store(&sum_re[to]);
                (Eight::load(&sum_im[to]) + new_im).store(&sum_im[to]);
            }
        }
    }
};

Waves waves_of(const Scene& scene, const std::vector<double>& record, int n_t, int n_x, double top, double slowest) {
    const Sampling& s = scene.sampling;
    const std::size_t n_w = static_cast<std::size_t>(n_t) / 2 + 1, width = static_cast<std::size_t>(n_x),
                      traces = static_cast<std::size_t>(s.traces), samples = static_cast<std::size_t>(s.samples);
    const double dt = s.window / s.samples;
    const std::size_t bins = std::min(n_w, static_cast<std::size_t>(top * n_t * dt) + 1);
    Transform transform;
    std::vector<Complex> field(bins * width);  // [frequency][x]
    {
        CloseUp close_up(scene);
        std::vector<double> row(static_cast<std::size_t>(n_t));
        std::vector<Complex> half(n_w);
        for (std::size_t i = 0; i < traces; ++i) {
            close_up(record.data() + i * samples, row.data());
            transform.split_real(row.data(), half.data(), n_t);
            for (std::size_t w = 0; w < bins; ++w) field[w * width + i] = half[w];
        }
    }
    Waves waves;
    waves.dk = 2.0 * pi / (n_x * s.step);
    std::vector<Complex> out(width);
    for (std::size_t k = 1; k < bins; ++k) {
        const double w = 2.0 * pi * static_cast<double>(k) / (n_t * dt);
        const double widest = 2.0 * w / slowest / waves.dk;
        const int reach = static_cast<int>(std::min(std::ceil(widest) - 1.0, 0.5 * n_x - 1.0));
        const int at = waves.add(w, reach);
        transform.sum(field.data() + k * width, out.data(), n_x);  // exp(+j kx x): kx runs the other way
        const Complex start = std::exp(Complex{0.0, -w * s.start});
        for (int turn_count = -reach; turn_count <= reach; ++turn_count) {
            Complex value = start * out[static_cast<std::size_t>((n_x - turn_count) % n_x)];
            if (scene.height > 0.0)
                value *= Complex(waves.phase(waves.frequencies.back(), turn_count, speed_of_light, scene.height));
            const std::size_t i = static_cast<std::size_t>(at + reach + turn_count);
            waves.re[i] = static_cast<float>(value.real());
            waves.im[i] = static_cast<float>(value.imag());
        }
    }
    return waves;
}

}  // namespace

Image focused(const Scene& scene, const std::vector<double>& record, Depths depths) {
    const Sampling& s = scene.sampling;
    Image image;
    const std::size_t traces = static_cast<std::size_t>(std::max(0, s.traces)),
                      samples = static_cast<std::size_t>(std::max(0, s.samples));
    if (!fault_of(scene).empty() || record.size() != traces * samples || !(depths.from >= 0.0)) {
        image.issue = Issue::out_of_range;
        return image;
    }
    const int n_t = 4 * fast_length((s.samples * 5 / 4 + 3) / 4), n_x = 4 * fast_length((s.traces * 3 / 2 + 8 + 3) / 4);
    const double frequency = scene.pulse.centre_frequency;
    const std::vector<double> speed = speeds(scene.ground, frequency);
    const double top = band_of(scene.pulse, 40.0).high;  // Hz; past it there is nothing but noise
    const double slowest = *std::min_element(speed.begin(), speed.end());
    const double reached = depth_after(scene.ground, 0.5 * (s.start + s.window), frequency).value;
    const double bottom = std::min(depths.to, reached);
    image.top = std::min(depths.from, bottom);
    image.spacing = slowest / (6.0 * top);
    image.rows = fast_length(std::clamp(static_cast<int>((bottom - image.top) / image.spacing) + 1, 2, 2048));
    image.spacing = std::max(image.spacing, (bottom - image.top) / image.rows);
    image.traces = s.traces;
    image.first = s.first;
    image.step = s.step;
    image.values.resize(traces * static_cast<std::size_t>(image.rows));

    Waves waves = waves_of(scene, record, n_t, n_x, top, slowest);
    const std::size_t half = static_cast<std::size_t>(n_x) / 2 + 1;
    std::vector<float> re(static_cast<std::size_t>(2 * waves.turns + 1 + lanes)), im(re.size());
    std::vector<Complex> in(half);
    std::vector<double> out(static_cast<std::size_t>(n_x));
    Transform transform;
    double depth = 0.0, largest = 0.0;  // of the waves, m; of the picture
    int layer = -1;
    for (int row = 0; row < image.rows; ++row) {
        const double target = image.top + row * image.spacing;
        const int here = layer_at(scene.ground, target);
        if (here != layer) {
            // To one step above the row through what is left of the layers passed (up, where that is nothing); then
            // even steps.
            for (int l = std::max(layer, 0); l <= here; ++l) {
                const double end = l < here ? top_of(scene.ground, l + 1) : target - image.spacing;
                waves.sink(speed[static_cast<std::size_t>(l)], end - depth);
                depth = end;
            }
            layer = here;
            waves.set_step(speed[static_cast<std::size_t>(here)], image.spacing);
        }
        waves.step(re, im);
        depth = target;
        // Only the real part is the picture: half a spectrum has it, the mean of kx and the conjugate of -kx.
        for (int t = 0; t <= waves.turns; ++t) {
            const std::size_t right = static_cast<std::size_t>(waves.turns + t),
                              left = static_cast<std::size_t>(waves.turns - t);
            in[static_cast<std::size_t>(t)] = {0.5 * static_cast<double>(re[left] + re[right]),
                                               0.5 * static_cast<double>(im[right] - im[left])};
        }
        transform.sum_real(in.data(), out.data(), n_x);
        for (std::size_t i = 0; i < traces; ++i) {
            image.values[i * static_cast<std::size_t>(image.rows) + row] = out[i];
            largest = std::max(largest, std::fabs(out[i]));
        }
    }
    image.peak = 2.0 * largest / (static_cast<double>(n_t) * n_x);
    if (largest > 0.0) {
        for (double& value : image.values) value /= largest;
    }
    return image;
}

}  // namespace gg

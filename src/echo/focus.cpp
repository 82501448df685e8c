#include "echo/focus.hpp"

#include <algorithm>
#include <cmath>

#include "echo/fast_complex.hpp"
#include "echo/transform.hpp"

namespace gg {
namespace {

/// A trace as if transmitter and receiver stood together, at the same sample times; four-point Lagrange between
/// samples.
void close_up(const double* trace, double* out, const std::vector<double>& delays, const Sampling& s) {
    const double dt = s.window / s.samples;
    for (int i = 0; i < s.samples; ++i) {
        const double time = s.start + i * dt, delay = delays[static_cast<std::size_t>(i)];
        const double at = (std::copysign(std::hypot(time, delay), time) - s.start) / dt;
        const int left = static_cast<int>(std::floor(at));
        const double u = at - left;
        const double weights[4] = {-u * (u - 1) * (u - 2) / 6, (u + 1) * (u - 1) * (u - 2) / 2,
                                   -(u + 1) * u * (u - 2) / 2, (u + 1) * u * (u - 1) / 6};
        double sum = 0.0;
        for (int k = 0; k < 4; ++k) {
            const int from = left - 1 + k;
            if (from >= 0 && from < s.samples) sum += weights[k] * trace[from];
        }
        out[i] = time > 0.0 ? sum : 0.0;
    }
}

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

}  // namespace

Image focused(const Scene& scene, const std::vector<double>& record, double down_to) {
    const Sampling& s = scene.sampling;
    Image image;
    const std::size_t traces = static_cast<std::size_t>(std::max(0, s.traces)),
                      samples = static_cast<std::size_t>(std::max(0, s.samples));
    if (!fault_of(scene).empty() || record.size() != traces * samples) {
        image.issue = Issue::out_of_range;
        return image;
    }
    const double dt = s.window / s.samples;
    const int n_t = 2 * fast_length((s.samples * 5 / 4 + 1) / 2), n_x = fast_length(s.traces * 3 / 2 + 8);
    const std::size_t n_w = static_cast<std::size_t>(n_t) / 2 + 1, width = static_cast<std::size_t>(n_x);

    // To frequency, then to horizontal wave number.
    Transform transform;
    std::vector<Complex> field(n_w * width);  // [frequency][x or kx]
    {
        const std::vector<double> delays = delays_of(scene);
        std::vector<double> row(static_cast<std::size_t>(n_t));
        std::vector<Complex> half(n_w);
        for (std::size_t i = 0; i < traces; ++i) {
            std::fill(row.begin(), row.end(), 0.0);
            close_up(record.data() + i * samples, row.data(), delays, s);
            transform.split_real(row.data(), half.data(), n_t);
            for (std::size_t w = 0; w < n_w; ++w) field[w * width + i] = half[w];
        }
    }
    std::vector<double> speed = speeds(scene.ground, scene.pulse.centre_frequency);
    const double top = band_of(scene.pulse, 40.0).high;  // Hz; past it there is nothing but noise
    double slowest = speed_of_light;
    for (const double v : speed) slowest = std::min(slowest, v);
    const double deepest =
        std::min(down_to, depth_after(scene.ground, 0.5 * (s.start + s.window), scene.pulse.centre_frequency).value);
    image.spacing = slowest / (6.0 * top);
    image.rows = fast_length(std::clamp(static_cast<int>(deepest / image.spacing) + 1, 2, 2048));
    image.spacing = std::max(image.spacing, deepest / image.rows);

    // Every wave's phase at the surface and its step per row in each layer; then all waves summed at each row.
    struct Wave {
        std::size_t bin;  // of kx
        double kx2, w;
        Cx value;
    };
    std::vector<Wave> waves;
    std::vector<Complex> in(width), out(width);
    for (std::size_t k = 1; k < n_w; ++k) {
        const double f = static_cast<double>(k) / (n_t * dt), w = 2.0 * pi * f;
        if (f > top) break;
        transform.sum(field.data() + k * width, out.data(),
                      n_x);  // exp(+j kx x): bins run the other way, and so do they below
        for (std::size_t bin = 0; bin < width; ++bin) {
            const double turn_count =
                bin <= width / 2 ? static_cast<double>(bin) : static_cast<double>(bin) - static_cast<double>(width);
            const double kx = 2.0 * pi * turn_count / (n_x * s.step),
                         kz2 = 4.0 * w * w / (speed_of_light * speed_of_light) - kx * kx;
            if (!(kx * kx < 4.0 * w * w / (slowest * slowest))) continue;
            Complex value = out[bin] * std::exp(Complex{0.0, -w * s.start});
            if (scene.height > 0.0)
                value = kz2 > 0.0 ? value * std::exp(Complex{0.0, std::sqrt(kz2) * scene.height}) : Complex{};
            waves.push_back({bin, kx * kx, w, value});
        }
    }
    std::vector<Cx> step(waves.size());
    image.traces = s.traces;
    image.first = s.first;
    image.step = s.step;
    image.values.assign(traces * static_cast<std::size_t>(image.rows), 0.0);
    double depth = 0.0, largest = 0.0;
    int layer = -1;
    const auto go = [&](double way, std::size_t at, double v) {
        const double kz2 = 4.0 * waves[at].w * waves[at].w / (v * v) - waves[at].kx2;
        return kz2 > 0.0 ? Cx{std::cos(std::sqrt(kz2) * way), std::sin(std::sqrt(kz2) * way)} : Cx{};
    };
    for (int row = 0; row < image.rows; ++row) {
        const double target = row * image.spacing;
        const int here = layer_at(scene.ground, target);
        if (here != layer) {
            // Down to the row through what is left of the layers passed; then even steps.
            for (int l = std::max(layer, 0); l <= here; ++l) {
                const double bottom = l < here ? top_of(scene.ground, l + 1) : target;
                for (std::size_t i = 0; i < waves.size(); ++i)
                    waves[i].value = waves[i].value * go(bottom - depth, i, speed[l]);
                depth = bottom;
            }
            layer = here;
            for (std::size_t i = 0; i < waves.size(); ++i) step[i] = go(image.spacing, i, speed[here]);
        } else {
            for (std::size_t i = 0; i < waves.size(); ++i) waves[i].value = waves[i].value * step[i];
            depth = target;
        }
        std::fill(in.begin(), in.end(), Complex{});
        for (const Wave& wave : waves) in[wave.bin] += Complex(wave.value);
        // Back from kx: the conjugate's sum, of which the real part is the picture.
        for (Complex& value : in) value = std::conj(value);
        transform.sum(in.data(), out.data(), n_x);
        for (std::size_t i = 0; i < traces; ++i) {
            const double value = out[i].real();
            image.values[i * static_cast<std::size_t>(image.rows) + row] = value;
            largest = std::max(largest, std::fabs(value));
        }
    }
    image.peak = 2.0 * largest / (static_cast<double>(n_t) * n_x);
    if (largest > 0.0) {
        for (double& value : image.values) value /= largest;
    }
    return image;
}

}  // namespace gg

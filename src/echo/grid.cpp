#include "echo/grid.hpp"

#include <algorithm>
#include <array>
#include <cmath>

#include "echo/lanes.hpp"

namespace gg {
namespace {

constexpr double oversampling = 1.5;
constexpr int taps = 16;
constexpr int lane = 8;  // two Fours

int in_lanes(int n) { return (n + lane - 1) / lane * lane; }

/// Windowed-sinc weights of the points floor - 7 .. floor + 8 for a place `part` (0..1) past the floor.
std::array<double, taps> weights(double part) {
    constexpr double half = taps / 2, shape = pi * half * (1.0 - 1.0 / oversampling);
    const double wave = std::sin(pi * part) / pi;
    std::array<double, taps> out{};
    for (int i = 0; i < taps; ++i) {
        const int tap = i + 1 - taps / 2;
        const double d = part - tap, inside = 1.0 - d * d / (half * half);
        if (!(inside > 0.0)) continue;
        const double sinc = std::fabs(d) < 1e-9 ? 1.0 : ((tap & 1) ? -wave : wave) / d;
        out[i] = sinc * std::exp(shape * (std::sqrt(inside) - 1.0));
    }
    return out;
}

/// The same for many places, between entries of a table: linear in 1/512 of a point is good to 5e-6.
struct Weights {
    static constexpr int count = 512;
    std::array<std::array<double, taps>, count + 1> at;
    Weights() {
        for (int i = 0; i <= count; ++i) at[i] = weights(static_cast<double>(i) / count);
    }
};

/// Rows of numbers, real and imaginary parts apart.
struct Rows {
    int width = 0;
    std::vector<float> re, im;
    Rows(int rows, int w) : width(in_lanes(w)), re(static_cast<std::size_t>(rows) * width), im(re.size()) {}
    std::size_t at(int row) const { return static_cast<std::size_t>(row) * width; }
    /// Largest magnitude of each row, from every third number.
    std::vector<double> strongest() const {
        std::vector<double> out;
        for (std::size_t from = 0; from < re.size(); from += width) {
            float most = 0.0F;
            for (int i = 0; i < width; i += 3)
                most = std::max(most, re[from + i] * re[from + i] + im[from + i] * im[from + i]);
            out.push_back(std::sqrt(static_cast<double>(most)));
        }
        return out;
    }
};

/// cos and sin of kx d at d = i * spacing, a row per kx.
Rows waves(double spacing, int distances, double dk, int count) {
    Rows out(count, distances);
    const std::size_t n = static_cast<std::size_t>(out.width);
    std::vector<double> turn_re(n), turn_im(n), re(n, 1.0), im(n, 0.0);
    for (std::size_t i = 0; i < n; ++i) {
        turn_re[i] = std::cos(dk * spacing * static_cast<double>(i));
        turn_im[i] = std::sin(dk * spacing * static_cast<double>(i));
    }
    for (int k = 0; k < count; ++k) {
        float* const to_re = out.re.data() + out.at(k);
        float* const to_im = out.im.data() + out.at(k);
        for (std::size_t i = 0; i < n; ++i) {
            to_re[i] = static_cast<float>(re[i]);
            to_im[i] = static_cast<float>(im[i]);
            const double next = re[i] * turn_re[i] - im[i] * turn_im[i];
            im[i] = im[i] * turn_re[i] + re[i] * turn_im[i];
            re[i] = next;
        }
    }
    return out;
}

/// out[column][i] = sum_k wave[k][i] * spectrum[k][column]; columns in fours.
void sum_waves(const float* wave, const float* spectrum, int count, int width, int columns, float* out) {
    for (int column = 0; column < columns; column += 4) {
        for (int from = 0; from < width; from += lane) {
            Four sum[4][2] = {};
            for (int k = 0; k < count; ++k) {
                const float* const w = wave + static_cast<std::size_t>(k) * width + from;
                const float* const s = spectrum + static_cast<std::size_t>(k) * columns + column;
                const Four w0 = load(w), w1 = load(w + 4);
                for (int c = 0; c < 4; ++c) {
                    sum[c][0] += w0 * s[c];
                    sum[c][1] += w1 * s[c];
                }
            }
            for (int c = 0; c < 4; ++c) {
                float* const to = out + static_cast<std::size_t>(column + c) * width + from;
                store(to, sum[c][0]);
                store(to + 4, sum[c][1]);
            }
        }
    }
}

/// Incident coefficients at one depth for sources at a distance d = i * spacing to the right. With alpha and beta the
/// spectra of order n at +kx and, but for (-1)^n, at -kx:
///   a_n, a_-n = (-j)^n (C +- S),  C = sum (alpha + (-1)^n beta) cos kx d,  S = j sum (alpha - (-1)^n beta) sin kx d.
struct Table {
    double above;
    int order, width;
    std::vector<float> even, odd;  ///< re C_n, im C_n and so on, a column of `width` each

    Table(const Scatterer& target, int top_order, const Host& host, const Spectra& spectra, int count, double loudness,
          const Rows& wave)
        : above(target.above), order(top_order), width(wave.width) {
        const int columns = (2 * order + 2 + 3) / 4 * 4;
        std::vector<float> sums(static_cast<std::size_t>(count) * columns), differences(sums.size());
        const Cx inverse_k = Cx{1.0} / spectra.k;
        for (int k = 0; k < count; ++k) {
            const std::size_t at = static_cast<std::size_t>(k);
            const double kx = k * spectra.spacing;
            const Cx kz = spectra.kz[at], sent = (spectra.spacing / loudness * (k == 0 ? 0.5 : 1.0)) * spectra.down[at];
            const Cx down = sent * target.to_top[at];
            const Cx up = host.endless() ? Cx{} : sent * spectra.below[at] * spectra.pass[at] * target.to_bottom[at];
            const Cx E = (Cx{kx} + turn(kz)) * inverse_k, E_inverse = (Cx{kx} - turn(kz)) * inverse_k;
            Cx P{1.0}, Q{1.0};
            double sign = 1.0;
            for (int n = 0; n <= order; ++n, P = P * E, Q = Q * E_inverse, sign = -sign) {
                const Cx alpha = down * Q + up * P, beta = sign * (down * P + up * Q), sum = alpha + beta,
                         difference = turn(alpha - beta);
                const std::size_t to = at * columns + 2 * static_cast<std::size_t>(n);
                sums[to] = static_cast<float>(sum.re);
                sums[to + 1] = static_cast<float>(sum.im);
                differences[to] = static_cast<float>(difference.re);
                differences[to + 1] = static_cast<float>(difference.im);
            }
        }
        even.resize(static_cast<std::size_t>(columns) * width);
        odd.resize(even.size());
        sum_waves(wave.re.data(), sums.data(), count, width, columns, even.data());
        sum_waves(wave.im.data(), differences.data(), count, width, columns, odd.data());
    }

    /// a_n (side 1) or a_-n (side -1) at distances (first + i) * spacing of either side, scaled.
    void lay_out(int n, int side, Cx scale, int first, int count, float* re, float* im) const {
        const float* const C = even.data() + 2 * static_cast<std::size_t>(n) * width;
        const float* const S = odd.data() + 2 * static_cast<std::size_t>(n) * width;
        const float s_re = static_cast<float>(scale.re), s_im = static_cast<float>(scale.im);
        const auto put = [&](int i, int at, float turned) {
            const float a_re = C[at] + turned * S[at], a_im = C[width + at] + turned * S[width + at];
            re[i] = s_re * a_re - s_im * a_im;
            im[i] = s_re * a_im + s_im * a_re;
        };
        const float right = static_cast<float>(side);
        const int zero = std::clamp(-first, 0, count), end = std::clamp(width - first, zero, count);
        for (int i = 0; i < zero; ++i) put(i, std::min(-first - i, width - 1), -right);
        for (int i = zero; i < end; ++i) put(i, first + i, right);
        for (int i = end; i < count; ++i) re[i] = im[i] = 0.0F;  // lanes that nobody reads
    }
};

/// out[i] = sign * sum_t weight[t] in[i + t], for real and imaginary parts.
void interpolate(const std::array<float, taps>& weight, float sign, const float* re, const float* im, float* out_re,
                 float* out_im, int width) {
    for (int from = 0; from < width; from += lane) {
        Four re0{}, re1{}, im0{}, im1{};
        for (int t = 0; t < taps; ++t) {
            const float w = weight[t];
            re0 += w * load(re + from + t);
            re1 += w * load(re + from + t + 4);
            im0 += w * load(im + from + t);
            im1 += w * load(im + from + t + 4);
        }
        store(out_re + from, sign * re0);
        store(out_re + from + 4, sign * re1);
        store(out_im + from, sign * im0);
        store(out_im + from + 4, sign * im1);
    }
}

/// How a row of a table is read at distances first + i * spacing, half as far apart as its own.
struct Reading {
    int left;     ///< of the table, left of the first distance
    int skip[2];  ///< from there on for even i, for odd i
    std::array<float, taps> weight[2];

    Reading(double first, double spacing) : left(static_cast<int>(std::floor(first / (2.0 * spacing)))) {
        for (int p = 0; p < 2; ++p) {
            const double place = first / (2.0 * spacing) + 0.5 * p, floor = std::floor(place);
            skip[p] = static_cast<int>(floor) - left;
            const std::array<double, taps> w = weights(place - floor);
            for (int t = 0; t < taps; ++t) weight[p][t] = static_cast<float>(w[t]);
        }
    }
};

/// Scaled incident coefficients of one target, orders -order .. order from `row` on, on the grid's even points, then
/// its odd ones: `a` for the transmitter, in `g` for the receiver (-1)^n a_-n, as reciprocity asks.
void illuminate(const Table& table, const Scatterer& target, const Grid& grid, double separation, int row, Rows& a,
                Rows& g) {
    const double first = grid.start - target.x;
    const Reading at_a(first - 0.5 * separation, grid.spacing), at_g(first + 0.5 * separation, grid.spacing);
    const int ahead = at_g.left - at_a.left, count = grid.half + taps + 1 + ahead;
    std::vector<float> re(static_cast<std::size_t>(count)), im(re.size());
    const auto read = [&](const Reading& reading, int from, float sign, int to_row, Rows& out) {
        for (int p = 0; p < 2; ++p) {
            const std::size_t to = out.at(to_row) + static_cast<std::size_t>(p * grid.half);
            const int at = from + reading.skip[p];
            interpolate(reading.weight[p], sign, re.data() + at, im.data() + at, out.re.data() + to, out.im.data() + to,
                        grid.half);
        }
    };
    Cx turned{1.0};
    float sign = 1.0F;
    for (int n = 0; n <= target.order(); ++n, turned = -turn(turned), sign = -sign) {
        const Cx scale = Cx{target.root[static_cast<std::size_t>(n)]} * turned;
        for (const int side : {1, -1}) {
            if (n == 0 && side < 0) continue;
            table.lay_out(n, side, scale, at_a.left + 1 - taps / 2, count, re.data(), im.data());
            read(at_a, 0, 1.0F, row + target.order() + side * n, a);
            read(at_g, ahead, sign, row + target.order() - side * n, g);
        }
    }
}

/// sum_i g_i sum_j T_ij a_j, over the parts of T that count, by what stands on either side of them at its strongest.
std::vector<Complex> join(const Rows& a, const Rows& g, const std::vector<Complex>& joint, double share) {
    const std::vector<double> a_most = a.strongest(), g_most = g.strongest();
    const std::size_t rows = a_most.size();
    std::vector<double> size(joint.size());
    double most = 0.0;
    for (std::size_t i = 0; i < joint.size(); ++i)
        most = std::max(most, size[i] = std::sqrt(std::norm(joint[i])) * g_most[i / rows] * a_most[i % rows]);
    struct Part {
        std::size_t from;
        float re, im;
    };
    std::vector<std::vector<Part>> parts(rows);
    for (std::size_t i = 0; i < joint.size(); ++i) {
        if (size[i] > 0.1 * share * most)
            parts[i / rows].push_back({a.at(static_cast<int>(i % rows)), static_cast<float>(joint[i].real()),
                                       static_cast<float>(joint[i].imag())});
    }
    std::vector<Complex> out(static_cast<std::size_t>(a.width));
    for (int from = 0; from < a.width; from += lane) {
        Four sum_re[2] = {}, sum_im[2] = {};
        for (std::size_t i = 0; i < rows; ++i) {
            if (parts[i].empty()) continue;
            Four re[2] = {}, im[2] = {};
            for (const Part& part : parts[i]) {
                const float* const at_re = a.re.data() + part.from + from;
                const float* const at_im = a.im.data() + part.from + from;
                for (int p = 0; p < 2; ++p) {
                    const Four a_re = load(at_re + 4 * p), a_im = load(at_im + 4 * p);
                    re[p] += part.re * a_re - part.im * a_im;
                    im[p] += part.re * a_im + part.im * a_re;
                }
            }
            for (int p = 0; p < 2; ++p) {
                const std::size_t at = g.at(static_cast<int>(i)) + static_cast<std::size_t>(from + 4 * p);
                const Four g_re = load(g.re.data() + at), g_im = load(g.im.data() + at);
                sum_re[p] += g_re * re[p] - g_im * im[p];
                sum_im[p] += g_re * im[p] + g_im * re[p];
            }
        }
        for (int p = 0; p < lane; ++p)
            out[static_cast<std::size_t>(from + p)] = {static_cast<double>(sum_re[p / 4][p % 4]),
                                                       static_cast<double>(sum_im[p / 4][p % 4])};
    }
    return out;
}

}  // namespace

Grid grid_for(const Track& line, double widest) {
    Grid grid;
    grid.spacing = pi / (2.0 * widest * oversampling);
    grid.start = line.first - (taps / 2) * grid.spacing;
    const double span = line.step * (line.traces - 1);
    grid.half = in_lanes((static_cast<int>(std::ceil(span / grid.spacing)) + taps + 2) / 2);
    return grid;
}

std::vector<Complex> echo_on(const Grid& grid, const Track& line, const std::vector<Scatterer>& targets,
                             const Host& host, const Spectra& spectra, int count, const std::vector<Complex>& joint,
                             double share) {
    int rows = 0;
    double farthest = 0.0, nearest = targets[0].above;
    for (const Scatterer& target : targets) {
        rows += target.size();
        const double left = grid.start - target.x, right = left + 2 * grid.half * grid.spacing;
        farthest = std::max({farthest, -left, right});
        nearest = std::min(nearest, target.above);
    }
    farthest += 0.5 * line.separation;
    // What is left of the wave on its way down is taken out, that floats keep their range in lossy ground.
    double loudness = std::sqrt(norm(spectra.down[0] * travel(spectra.kz[0], nearest)));
    if (!(loudness > 0.0)) loudness = 1.0;
    const int distances = static_cast<int>(farthest / (2.0 * grid.spacing)) + taps / 2 + 2;
    const Rows wave = waves(2.0 * grid.spacing, distances, spectra.spacing, count);
    std::vector<Table> tables;
    Rows a(rows, 2 * grid.half), g(rows, 2 * grid.half);
    int row = 0;
    for (const Scatterer& target : targets) {
        const auto level = [&](const auto& other) { return other.above == target.above; };
        auto table = std::find_if(tables.begin(), tables.end(), level);
        if (table == tables.end()) {
            int order = 0;
            for (const Scatterer& other : targets)
                if (level(other)) order = std::max(order, other.order());
            tables.emplace_back(target, order, host, spectra, count, loudness, wave);
            table = tables.end() - 1;
        }
        illuminate(*table, target, grid, line.separation, row, a, g);
        row += target.size();
    }
    std::vector<Complex> out = join(a, g, joint, share);
    for (Complex& value : out) value *= loudness * loudness;
    return out;
}

void onto_traces(const Grid& grid, const Track& line, const std::vector<Complex>& values, Complex factor, Complex* out,
                 std::size_t stride) {
    static const Weights table;
    for (int trace = 0; trace < line.traces; ++trace) {
        const double at = (line.first + trace * line.step - grid.start) / grid.spacing;
        const int left = static_cast<int>(at);
        const double entry = (at - left) * Weights::count;
        const int low = std::min(static_cast<int>(entry), Weights::count - 1);
        const double part = entry - low;
        const std::array<double, taps>&one = table.at[low], &other = table.at[low + 1];
        double re = 0.0, im = 0.0;
        for (int t = 0; t < taps; ++t) {
            const int i = left + 1 - taps / 2 + t;
            const Complex& value = values[static_cast<std::size_t>((i >> 1) + (i & 1) * grid.half)];
            const double weight = one[t] + part * (other[t] - one[t]);
            re += weight * value.real();
            im += weight * value.imag();
        }
        out[static_cast<std::size_t>(trace) * stride] += factor * Complex{re, im};
    }
}

}  // namespace gg

#pragma once
/// Floats side by side, on every machine the engine runs on: where a sum needs 1e-5 and no more.
#include <algorithm>
#include <cmath>
#include <cstring>
#include <vector>

namespace gg {

/// Two registers' worth, as four is what every machine has.
struct Eight {
    using Four [[gnu::vector_size(16)]] = float;
    Four low, high;
    static Eight load(const float* from) {
        Eight value;
        std::memcpy(&value.low, from, sizeof value.low);
        std::memcpy(&value.high, from + 4, sizeof value.high);
        return value;
    }
    void store(float* to) const {
        std::memcpy(to, &low, sizeof low);
        std::memcpy(to + 4, &high, sizeof high);
    }
    float sum() const {
        const Four both = low + high;
        return (both[0] + both[2]) + (both[1] + both[3]);
    }
    float operator[](int i) const { return i < 4 ? low[i] : high[i - 4]; }
    Eight& operator+=(Eight b) {
        low += b.low;
        high += b.high;
        return *this;
    }
};
inline Eight operator+(Eight a, Eight b) { return {a.low + b.low, a.high + b.high}; }
inline Eight operator-(Eight a, Eight b) { return {a.low - b.low, a.high - b.high}; }
inline Eight operator*(Eight a, Eight b) { return {a.low * b.low, a.high * b.high}; }
inline Eight operator*(float a, Eight b) { return {a * b.low, a * b.high}; }
constexpr int lanes = 8;

inline int in_lanes(int n) { return (n + lanes - 1) / lanes * lanes; }

/// Rows of complex numbers, real and imaginary parts apart, their width a multiple of `lanes`.
struct Rows {
    int width = 0;
    std::vector<float> re, im;
    Rows() = default;
    Rows(int rows, int w) : width(in_lanes(w)), re(static_cast<std::size_t>(rows) * width), im(re.size()) {}
    std::size_t at(int row) const { return static_cast<std::size_t>(row) * width; }
    /// Largest magnitude among the first `count` of a row, from every third of them.
    double strongest(int row, int count) const {
        float most = 0.0F;
        for (std::size_t i = at(row); i < at(row) + static_cast<std::size_t>(count); i += 3)
            most = std::max(most, re[i] * re[i] + im[i] * im[i]);
        return std::sqrt(static_cast<double>(most));
    }
};

}  // namespace gg

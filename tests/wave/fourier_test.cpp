#include "wave/fourier.hpp"

#include <random>

#include "near.hpp"

using namespace gg;

namespace {

std::vector<double> noise(std::size_t n) {
    std::mt19937 dice(static_cast<unsigned>(n) + 1);
    std::normal_distribution<double> bell;
    std::vector<double> values(n);
    for (double& x : values) x = bell(dice);
    return values;
}

/// The sum itself, term by term.
Complex by_hand(const std::vector<Complex>& values, std::size_t k) {
    Complex sum{};
    for (std::size_t i = 0; i < values.size(); ++i)
        sum += values[i] * std::polar(1.0, -2.0 * pi * static_cast<double>(i * k) / static_cast<double>(values.size()));
    return sum;
}

}  // namespace

TEST_CASE("transforms of every length agree with the sum written out") {
    for (std::size_t n = 1; n <= 40; ++n) {
        CAPTURE(n);
        const std::vector<double> values = noise(n);
        const std::vector<Complex> complex(values.begin(), values.end());
        const std::vector<Complex> half = forward(values), whole = forward(complex);
        REQUIRE(half.size() == n / 2 + 1);
        REQUIRE(whole.size() == n);
        for (std::size_t k = 0; k < n; ++k) CHECK(std::abs(whole[k] - by_hand(complex, k)) < 1e-12);
        for (std::size_t k = 0; k < half.size(); ++k) CHECK(std::abs(half[k] - by_hand(complex, k)) < 1e-12);
        const std::vector<double> back = inverse(half, n);
        const std::vector<Complex> complex_back = inverse(whole);
        for (std::size_t i = 0; i < n; ++i) {
            CHECK(std::abs(back[i] - values[i]) < 1e-12);
            CHECK(std::abs(complex_back[i] - values[i]) < 1e-12);
        }
    }
}

TEST_CASE("long transforms keep the power") {
    for (const std::size_t n : {1024U, 1500U, 4096U}) {
        const std::vector<double> values = noise(n);
        const std::vector<Complex> complex(values.begin(), values.end());
        double before = 0.0, after = 0.0;
        for (const double x : values) before += x * x;
        for (const Complex& x : forward(complex)) after += std::norm(x);
        CHECK(after / static_cast<double>(n) == doctest::Approx(before).epsilon(1e-12));
    }
}

TEST_CASE("the envelope of a tone is its amplitude, of a modulated tone its modulation") {
    for (const std::size_t n : {256U, 255U}) {
        std::vector<double> tone(n), beat(n);
        for (std::size_t i = 0; i < n; ++i) {
            const double turn = 2.0 * pi * static_cast<double>(i) / static_cast<double>(n);
            tone[i] = 3.0 * std::cos(20.0 * turn + 0.3);
            beat[i] = (2.0 + std::cos(2.0 * turn)) * std::cos(30.0 * turn);
        }
        const std::vector<double> flat = envelope(tone), wavy = envelope(beat);
        for (std::size_t i = 0; i < n; ++i) {
            CHECK(flat[i] == doctest::Approx(3.0));
            CHECK(wavy[i] ==
                  doctest::Approx(2.0 + std::cos(4.0 * pi * static_cast<double>(i) / static_cast<double>(n))));
        }
    }
}

TEST_CASE("nothing in, nothing out; a wrong half spectrum gives zeros") {
    CHECK(forward(std::span<const double>{}).empty());
    CHECK(inverse(std::span<const Complex>{}).empty());
    CHECK(envelope({}).empty());
    const std::vector<Complex> three(3);
    CHECK(inverse(three, 9) == std::vector<double>(9, 0.0));
    CHECK(length_of_two(100.0, 64, 4096) == 128);
    CHECK(length_of_two(1e9, 64, 4096) == 4096);
    CHECK(length_of_two(std::nan(""), 64, 4096) == 64);
}

#pragma once
/// Complex arithmetic for the inner loops. std::complex has to rescue infinities in every product and quotient, which
/// keeps the compiler from vectorising; here every number is finite.
#include <cmath>

#include "wave/constants.hpp"

namespace gg {

struct Cx {
    double re = 0.0, im = 0.0;
    constexpr Cx() = default;
    constexpr Cx(double r, double i = 0.0) : re(r), im(i) {}
    Cx(Complex z) : re(z.real()), im(z.imag()) {}
    operator Complex() const { return {re, im}; }
    constexpr Cx& operator+=(Cx b) {
        re += b.re;
        im += b.im;
        return *this;
    }
};
constexpr Cx operator+(Cx a, Cx b) { return {a.re + b.re, a.im + b.im}; }
constexpr Cx operator-(Cx a, Cx b) { return {a.re - b.re, a.im - b.im}; }
constexpr Cx operator-(Cx a) { return {-a.re, -a.im}; }
constexpr Cx operator*(Cx a, Cx b) { return {a.re * b.re - a.im * b.im, a.re * b.im + a.im * b.re}; }
constexpr Cx operator*(double a, Cx b) { return {a * b.re, a * b.im}; }
constexpr Cx conj(Cx a) { return {a.re, -a.im}; }
constexpr double norm(Cx a) { return a.re * a.re + a.im * a.im; }
constexpr Cx operator/(Cx a, Cx b) { return (1.0 / norm(b)) * (a * conj(b)); }
/// j times a.
constexpr Cx turn(Cx a) { return {-a.im, a.re}; }

/// Principal square root of a number with Im <= 0: Re >= 0, Im <= 0.
inline Cx root_below(Cx a) {
    const double size = std::sqrt(norm(a));
    if (a.re >= 0.0) {
        const double re = std::sqrt(0.5 * (size + a.re));
        return {re, re > 0.0 ? 0.5 * a.im / re : 0.0};
    }
    const double im = -std::sqrt(0.5 * (size - a.re));
    return {0.5 * a.im / im, im};
}
/// Principal square root: Re >= 0.
inline Cx root(Cx a) { return a.im > 0.0 ? conj(root_below(conj(a))) : root_below(a); }
/// exp(-j a d): a wave's way over a distance d.
inline Cx travel(Cx a, double d) {
    const double size = std::exp(a.im * d), angle = -a.re * d;
    return {size * std::cos(angle), size * std::sin(angle)};
}

}  // namespace gg

#pragma once
/// Physical constants, SI. Time factor exp(+j w t) throughout: permittivity = eps' - j eps''.
#include <complex>
#include <numbers>

namespace gg {

using Complex = std::complex<double>;

constexpr double pi = std::numbers::pi;
constexpr double speed_of_light = 299792458.0;            ///< m/s, exact (SI)
constexpr double vacuum_permittivity = 8.8541878128e-12;  ///< F/m, CODATA 2018
constexpr double vacuum_permeability = 1.25663706212e-6;  ///< H/m, CODATA 2018
constexpr double vacuum_impedance = 376.730313668;        ///< ohm, CODATA 2018
constexpr double decibel_per_neper = 8.685889638065036;   ///< 20 / ln 10, exact

}  // namespace gg

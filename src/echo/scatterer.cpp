#include "echo/scatterer.hpp"

#include <algorithm>
#include <cmath>

#include "echo/cylinder_functions.hpp"

namespace gg {
namespace {

/// How steep the inner field is at a radius: slope over field (or field over slope when `inverted`), times the
/// impedance weight k (along) or k / permittivity (across). One of the two stays finite for each kind of wall.
struct Steepness {
    Complex slope, field;
};

Complex weight(const Inner& inner, Polarisation polarisation) {
    return polarisation == Polarisation::along ? inner.k : inner.k / inner.permittivity;
}

Steepness metal(Polarisation polarisation) {
    return polarisation == Polarisation::along ? Steepness{1.0, 0.0} : Steepness{0.0, 1.0};
}

/// Outgoing share in the medium of `f` that meets `inner` at its radius.
Complex share(const CylinderFunctions& f, int n, Complex w, const Steepness& inner) {
    const Complex h = w * f.h_slope(n) * inner.field - f.h[n] * inner.slope;
    return h == Complex{} ? Complex{} : -(w * f.j_slope(n) * inner.field - f.j[n] * inner.slope) / h;
}

/// Loss (Np over the radius) past which nothing comes back from the far side: the inner field's slope is then that of a
/// plane wave going in, J_n'(z)/J_n(z) = j.
constexpr double opaque = 200.0;

}  // namespace

std::vector<Complex> scatter(const Cylinder& cylinder, const Inner& host, int order, Polarisation polarisation) {
    const std::size_t count = static_cast<std::size_t>(order) + 1;
    std::vector<Steepness> wall(count, metal(polarisation));
    const double inner_radius = cylinder.radius - cylinder.wall;
    const Inner& inside = cylinder.inside;
    if (!inside.metal && -inside.k.imag() * inner_radius > opaque) {
        std::fill(wall.begin(), wall.end(), Steepness{weight(inside, polarisation) * Complex{0.0, 1.0}, 1.0});
    } else if (!inside.metal) {
        const CylinderFunctions f = cylinder_functions(inside.k * inner_radius, order);
        for (int n = 0; n <= order; ++n) wall[n] = {weight(inside, polarisation) * f.j_slope(n), f.j[n]};
    }
    const Inner& matter = cylinder.wall_matter;
    if (cylinder.wall > 0.0 && matter.metal) {
        std::fill(wall.begin(), wall.end(), metal(polarisation));
    } else if (cylinder.wall > 0.0 && -matter.k.imag() * cylinder.radius > opaque) {
        std::fill(wall.begin(), wall.end(), Steepness{weight(matter, polarisation) * Complex{0.0, 1.0}, 1.0});
    } else if (cylinder.wall > 0.0) {
        const Complex w = weight(matter, polarisation);
        const CylinderFunctions in = cylinder_functions(matter.k * inner_radius, order);
        const CylinderFunctions out = cylinder_functions(matter.k * cylinder.radius, order);
        for (int n = 0; n <= order; ++n) {
            const Complex c = share(in, n, w, wall[n]);
            wall[n] = {w * (out.j_slope(n) + c * out.h_slope(n)), out.j[n] + c * out.h[n]};
        }
    }
    const CylinderFunctions f = cylinder_functions(host.k * cylinder.radius, order);
    std::vector<Complex> s(count);
    for (int n = 0; n <= order; ++n) s[n] = share(f, n, weight(host, polarisation), wall[n]);
    return s;
}

}  // namespace gg

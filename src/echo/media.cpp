#include "echo/media.hpp"

#include <cmath>

namespace gg {
namespace {

/// w eps(w) on the real axis, both signs of w: a real field's eps(-w) is conj(eps(w)).
Complex displaced(const Material& material, double w) {
    constexpr double lowest = 2.0 * pi * 1e3;  // the conduction term's limit for w -> 0 is reached well above this
    const double size = std::fmax(std::fabs(w), lowest);
    const Complex value = size * permittivity(material, size / (2.0 * pi)).value;
    return {value.real() * w / size, value.imag()};
}

Inner inner_at(const Material& material, double w, double delta) {
    if (material.model == Model::metal) return {true, {}, {}};
    const Complex here = displaced(material, w), after = displaced(material, w + delta),
                  before = displaced(material, w - delta);
    const Complex carried = here - Complex{0.0, 0.5} * (after - before) - 0.5 * (after - 2.0 * here + before);
    const Complex wc{w, -delta}, eps = carried / wc;
    return {false, std::sqrt(eps) * wc / speed_of_light, eps};
}

}  // namespace

Media media_at(const Scene& scene, double w, double delta) {
    Media media{{w, -delta}, {inner_at(air(), w, delta)}, {}};
    for (const Slab& slab : scene.ground.slabs) media.ground.push_back(inner_at(slab.material, w, delta));
    for (const RoundTarget& target : scene.targets) {
        Cylinder cylinder{target.radius, inner_at(target.inside, w, delta), 0.0, {}};
        if (target.wall) {
            cylinder.wall = target.wall->thickness;
            cylinder.wall_matter = inner_at(target.wall->material, w, delta);
        }
        media.cylinders.push_back(cylinder);
    }
    return media;
}

}  // namespace gg

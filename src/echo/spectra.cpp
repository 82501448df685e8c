#include "echo/spectra.hpp"

namespace gg {

PlaneWaves::PlaneWaves(const Media& media, const Stack& ground, Polarisation polarisation)
    : ground_(ground), k2_(media.ground.size()), weight_(k2_.size(), Cx{1.0}), g_(k2_.size()) {
    for (auto* list : {&kz, &r, &once, &D, &x}) list->resize(k2_.size());
    for (std::size_t i = 0; i < k2_.size(); ++i) {
        k2_[i] = media.ground[i].k * media.ground[i].k;
        if (polarisation == Polarisation::across) weight_[i] = 1.0 / media.ground[i].permittivity;
    }
}

void PlaneWaves::turn_to(double kx) {
    const std::size_t last = kz.size() - 1;
    for (std::size_t i = 0; i <= last; ++i) {
        kz[i] = root_below(k2_[i] - Cx{kx * kx});
        g_[i] = kz[i] * weight_[i];
        if (i > 0 && i < last) once[i] = travel(kz[i], ground_.slabs[i - 1].thickness);
    }
    for (std::size_t i = last; i-- > 0;) {
        r[i] = (g_[i] - g_[i + 1]) / (g_[i] + g_[i + 1]);
        D[i] = (r[i] + x[i + 1]) / (Cx{1.0} + r[i] * x[i + 1]);
        if (i > 0) x[i] = D[i] * once[i] * once[i];
    }
}

Spectra spectra_of(const Media& media, const Stack& ground, const Host& host, double height, Polarisation polarisation,
                   double spacing, int count) {
    Spectra s{spacing, media.ground[host.layer].k, {}, {}, {}, {}, {}};
    for (auto* list : {&s.kz, &s.down, &s.above, &s.below, &s.pass}) list->resize(static_cast<std::size_t>(count));
    const bool along = polarisation == Polarisation::along;
    const Cx source = along ? -vacuum_permeability / (4.0 * pi) * media.w : Complex{-1.0 / (4.0 * pi)};
    PlaneWaves waves(media, ground, polarisation);
    for (std::size_t at = 0; at < s.size(); ++at) {
        waves.turn_to(static_cast<double>(at) * spacing);
        Cx up = -waves.r[0];  // reflection looking up
        for (int i = 2; i <= host.layer; ++i) {
            const Cx y = up * waves.once[i - 1] * waves.once[i - 1];
            up = (y - waves.r[i - 1]) / (Cx{1.0} - waves.r[i - 1] * y);
        }
        Cx down = along ? source / waves.kz[0] : source;
        if (height > 0.0) down = down * travel(waves.kz[0], height);
        for (int i = 0; i < host.layer; ++i) {
            if (i > 0) down = down * waves.once[i];
            down = down * (Cx{1.0} + waves.r[i]) / (Cx{1.0} + waves.r[i] * waves.x[i + 1]);
        }
        s.kz[at] = waves.kz[host.layer];
        s.down[at] = down;
        s.above[at] = up;
        if (host.endless()) continue;
        s.below[at] = waves.D[host.layer];
        s.pass[at] = waves.once[host.layer];
    }
    return s;
}

}  // namespace gg

#include "echo/spectra.hpp"

namespace gg {

Spectra spectra_of(const Media& media, const Stack& ground, const Host& host, double height, Polarisation polarisation,
                   double spacing, int count) {
    // k, kz: wave number and its vertical part in each medium; g: kz (along) or kz/eps (across), whose ratios make the
    // reflection r_i of medium i on i + 1; e: once through a layer; D, U: reflection looking down and up.
    const int last = static_cast<int>(media.ground.size()) - 1;
    const std::size_t media_count = media.ground.size(), n = static_cast<std::size_t>(count);
    const bool along = polarisation == Polarisation::along;
    std::vector<Cx> k2(media_count), weight(media_count, Cx{1.0}), kz(media_count), g(media_count), r(media_count),
        e(media_count), D(media_count), x(media_count);
    for (std::size_t i = 0; i < media_count; ++i) {
        k2[i] = media.ground[i].k * media.ground[i].k;
        if (!along) weight[i] = 1.0 / media.ground[i].permittivity;
    }
    Spectra s{spacing, media.ground[host.layer].k, {}, {}, {}, {}, {}, {}, {}, {}};
    for (auto* list : {&s.kz, &s.down, &s.above, &s.below, &s.pass, &s.surface, &s.echo, &s.kz_air}) list->resize(n);
    const Cx source = along ? -vacuum_permeability / (4.0 * pi) * media.w : Complex{-1.0 / (4.0 * pi)};
    for (std::size_t at = 0; at < n; ++at) {
        const double kx = static_cast<double>(at) * spacing;
        for (int i = 0; i <= last; ++i) {
            kz[i] = root_below(k2[i] - Cx{kx * kx});
            g[i] = kz[i] * weight[i];
            if (i > 0 && i < last) e[i] = travel(kz[i], ground.slabs[static_cast<std::size_t>(i) - 1].thickness);
        }
        D[last] = x[last] = Cx{};
        for (int i = last - 1; i >= 0; --i) {
            r[i] = (g[i] - g[i + 1]) / (g[i] + g[i + 1]);
            D[i] = (r[i] + x[i + 1]) / (Cx{1.0} + r[i] * x[i + 1]);
            if (i > 0) x[i] = D[i] * e[i] * e[i];
        }
        Cx U = -r[0];
        for (int i = 2; i <= host.layer; ++i) {
            const Cx y = U * e[i - 1] * e[i - 1];
            U = (y - r[i - 1]) / (Cx{1.0} - r[i - 1] * y);
        }
        Cx down = source;
        if (along) down = down / kz[0];
        if (height > 0.0) down = down * travel(kz[0], height);
        for (int i = 0; i < host.layer; ++i) {
            if (i > 0) down = down * e[i];
            down = down * (Cx{1.0} + r[i]) / (Cx{1.0} + r[i] * x[i + 1]);
        }
        s.kz[at] = kz[host.layer];
        s.down[at] = down;
        s.above[at] = U;
        s.below[at] = D[host.layer];
        s.pass[at] = host.endless() ? Cx{} : e[host.layer];
        s.surface[at] = r[0];
        s.echo[at] = D[0] - r[0];
        s.kz_air[at] = kz[0];
    }
    return s;
}

}  // namespace gg

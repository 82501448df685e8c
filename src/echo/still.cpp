#include "echo/still.hpp"

#include <algorithm>
#include <cmath>

#include "echo/direct.hpp"
#include "echo/recording.hpp"
#include "echo/spectra.hpp"

namespace gg {
namespace {

constexpr double tolerance = 1e-4;  // of the strongest part, at the pulse's peak frequency

/// Echo of the boundaries below the surface at the receiver, per unit source: a sum over kx.
Complex layers_echo(const Scene& scene, const Media& media, double spacing, int count) {
    const bool along = scene.polarisation == Polarisation::along;
    const double angle = spacing * scene.separation;
    const Cx phase_step{std::cos(angle), std::sin(angle)};
    PlaneWaves waves(media, scene.ground, scene.polarisation);
    Cx sum, phase{1.0};
    for (int k = 0; k < count; ++k, phase = phase * phase_step) {
        waves.turn_to(k * spacing);
        const Cx kz = waves.kz[0];
        Cx value = (2.0 * phase.re * (k == 0 ? 0.5 : 1.0)) * (waves.D[0] - waves.r[0]);
        if (scene.height > 0.0) value = value * travel(kz, 2.0 * scene.height);
        sum += along ? value / kz : value * kz;
    }
    const Complex constant = along ? -media.w * vacuum_permeability : 1.0 / (media.w * vacuum_permittivity);
    return spacing / (4.0 * pi) * constant * Complex(sum);
}

Recording recording_of(const Scene& scene) { return {scene, -onset_of(scene.pulse), 0.0, 1}; }

/// The trace whose value at each tone is f(tone, media).
template <class F>
std::vector<double> trace_of(const Scene& scene, double care, const F& f) {
    Recording recording = recording_of(scene);
    for (const Tone& tone : recording.tones(faintest / care))
        recording.add(0, tone, f(tone, media_at(scene, tone.w.real(), recording.delta())));
    std::vector<double> out(static_cast<std::size_t>(scene.sampling.samples));
    recording.trace(0, out.data());
    return out;
}

}  // namespace

std::vector<double> direct_of(const Scene& scene, double care) {
    const double nearest = speed_of_light / (20.0 * scene.pulse.centre_frequency);
    return trace_of(scene, care, [&](const Tone& /*tone*/, const Media& media) {
        return direct_wave(media, std::max(scene.separation, nearest), scene.height, scene.polarisation);
    });
}

std::vector<double> layers_of(const Scene& scene, double care) {
    if (scene.ground.slabs.size() < 2) return std::vector<double>(static_cast<std::size_t>(scene.sampling.samples));
    // Along the surface images are not weak: they need the way of light in the recording's time.
    const double onset = onset_of(scene.pulse), end = recording_of(scene).end();
    const double spacing = 2.0 * pi / (speed_of_light * (end + onset) + 2.0 * scene.separation);
    return trace_of(scene, care, [&](const Tone& tone, const Media& media) {
        // Evanescent waves go down to the first boundary and back.
        const double fall = std::max(3.0, std::log(tone.loudness * care / tolerance));
        const double reach = 0.5 * fall / (scene.ground.slabs[0].thickness + scene.height);
        const int count = static_cast<int>(std::hypot(media.ground[1].k.real(), reach) / spacing) + 2;
        return layers_echo(scene, media, spacing, count);
    });
}

}  // namespace gg

/// How the section is computed, per frequency w - j delta of a grid that spans one stretch of time (recording):
///   source spectrum through the layers (spectra) -> standing waves about each target on a grid of positions (grid) ->
///   all targets' joint answer (coupling) -> echo by reciprocity -> traces; then one inverse transform per trace.
/// What sets the accuracy: what comes after the stretch wraps round, damped by exp(-6); the spacing of kx closes the
/// line on itself after Track::period, from where lateral waves of the images arrive; spectra are cut where the pulse
/// has fallen to `faintest`.
#include <algorithm>
#include <cmath>
#include <string>

#include "echo/engine.hpp"
#include "echo/noise.hpp"
#include "echo/scene.hpp"
#include "echo/still.hpp"

namespace gg {
namespace {

Section refused(Issue issue, std::string reason) {
    Section section;
    section.issue = issue;
    section.reason = std::move(reason);
    return section;
}

}  // namespace

Section section_of(const Scene& scene, double care) {
    if (std::string fault = fault_of(scene); !fault.empty()) return refused(Issue::out_of_range, std::move(fault));
    const Issue issue = materials_issue(scene);
    if (issue != Issue::none && issue != Issue::outside_band) return refused(issue, std::string(sentence(issue)));
    const Sampling& s = scene.sampling;
    Section section;
    section.traces = s.traces;
    section.samples = s.samples;
    section.first = s.first;
    section.step = s.step;
    section.start = s.start;
    section.dt = s.window / s.samples;
    section.issue = issue;
    section.targets =
        scene.targets.empty()
            ? std::vector<double>(static_cast<std::size_t>(s.traces) * static_cast<std::size_t>(s.samples))
            : Engine(scene, care).echoes();
    section.layers = layers_of(scene, care);
    section.direct = direct_of(scene, care);
    section.noise = white_noise(section.targets.size(), noise_level(scene), scene.noise.seed);
    return section;
}

}  // namespace gg

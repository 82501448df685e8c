#include <doctest/doctest.h>

#include <algorithm>

#include "sections.hpp"

// What holds for every scene, whatever is in it: each case draws scenes at random and sets two computations beside each
// other.

using namespace gg;

namespace {

/// Calls f on `count` random scenes that stand.
template <class F>
void for_scenes(unsigned seed, int count, bool dispersive, const F& f) {
    std::mt19937 random(seed);
    for (int i = 0; i < count; ++i) {
        const Scene s = random_scene(random, dispersive);
        CAPTURE(i);
        REQUIRE(fault_of(s) == "");
        f(s);
    }
}

/// All traces, the last first.
std::vector<double> turned(const Section& s) {
    std::vector<double> out;
    for (int t = s.traces - 1; t >= 0; --t) {
        const std::vector<double> trace = trace_of(s, t);
        out.insert(out.end(), trace.begin(), trace.end());
    }
    return out;
}

Scene mirrored(Scene s) {
    for (RoundTarget& t : s.targets) t.x = -t.x;
    s.sampling.first = -(s.sampling.first + s.sampling.step * (s.sampling.traces - 1));
    return s;
}

}  // namespace

TEST_CASE("With transmitter and receiver in one place a mirrored line records the mirrored section") {
    for_scenes(7, 6, true, [](Scene s) {
        s.separation = 0.0;
        const Section section = section_of(s);
        REQUIRE(section.ok());
        CHECK(rms(section.targets) > 0.0);
        CHECK(apart(section.targets, turned(section_of(mirrored(s)))) < 2e-3);
    });
}

TEST_CASE("Transmitter and receiver may change places") {
    // A mirrored line changes them; with the mirror symmetry above, what is left is reciprocity.
    for_scenes(9, 12, true, [](Scene s) {
        s.separation = std::max(s.separation, 0.1);
        CHECK(apart(section_of(s).targets, turned(section_of(mirrored(s)))) < 2e-3);
    });
}

TEST_CASE("Nothing arrives before the fastest way to a target and back") {
    for_scenes(8, 12, true, [](const Scene& s) {
        const Section section = section_of(s);
        const double fp = s.pulse.centre_frequency, peak = peak_of(section.targets);
        const double lead = 1.3 / fp;  // a Ricker pulse's own rise, from 1e-6 of its peak
        // No refracted path is shorter than each layer crossed upright, no part of the pulse faster than its fastest.
        bool soil = false;
        const auto slowness = [&](const Slab& slab) {
            soil = soil || slab.material.model == Model::soil_p527;
            double least = 1e9;
            for (const double f : {0.1 * fp, fp, 4.0 * fp})
                least = std::min(least, permittivity(slab.material, f).value.real());
            return std::sqrt(least) / speed_of_light;
        };
        double first = 1e9;
        for (const RoundTarget& t : s.targets) {
            double way = s.height / speed_of_light;
            const int host = layer_at(s.ground, t.depth);
            for (int l = 0; l <= host; ++l) {
                const Slab& slab = s.ground.slabs[static_cast<std::size_t>(l)];
                way += slowness(slab) * (l < host ? slab.thickness : t.depth - t.radius - top_of(s.ground, host));
            }
            first = std::min(first, 2.0 * way);
        }
        double early = 0.0;
        int before = 0;
        for (int trace = 0; trace < section.traces; ++trace) {
            for (int k = 0; k < section.samples && k * section.dt < first - lead; ++k, ++before)
                early = std::max(early, std::fabs(section.at(trace, k)));
        }
        // The soil model is a fit, real and imaginary part each by itself: its pulses do not begin quite sharply.
        CHECK(early < (soil ? 1e-2 : 5e-4) * peak);
        CHECK((before > 0 || first < lead));
    });
}

TEST_CASE("A later start shows the same trace later, a longer window the same trace and more") {
    for_scenes(10, 6, true, [](const Scene& s) {
        const Section a = section_of(s);
        constexpr int skip = 40;
        Scene later = s, longer = s;
        later.sampling.start = skip * a.dt;
        later.sampling.samples -= skip;
        later.sampling.window -= skip * a.dt;
        longer.sampling.samples *= 2;
        longer.sampling.window *= 2;
        const Section b = section_of(later), c = section_of(longer);
        std::vector<double> tail, head;
        for (int trace = 0; trace < a.traces; ++trace) {
            const std::vector<double> plain = trace_of(a, trace), more = trace_of(c, trace);
            tail.insert(tail.end(), plain.begin() + skip, plain.end());
            head.insert(head.end(), more.begin(), more.begin() + a.samples);
        }
        // The engine's damping of late times, undone, makes most of its cut-offs at the end of the shorter window.
        CHECK(apart(b.targets, tail) < 1e-2);
        CHECK(apart(head, a.targets) < 2e-2);
    });
}

TEST_CASE("Neither where the line begins to count nor in which order the targets are listed matters") {
    for_scenes(11, 6, true, [](const Scene& s) {
        Scene moved = s;
        moved.sampling.first += 37.3;
        for (RoundTarget& t : moved.targets) t.x += 37.3;
        std::reverse(moved.targets.begin(), moved.targets.end());
        CHECK(apart(section_of(moved).targets, section_of(s).targets) <
              1e-3);  // the engine's own positions lie elsewhere
    });
}

TEST_CASE("A world three times as large, three times slower, with a third of the conductivity answers the same") {
    // Maxwell's equations have no length of their own: fields per ampere are a third as strong.
    constexpr double times = 3.0;
    for_scenes(12, 6, false, [](const Scene& s) {
        Scene large = s;
        large.pulse.centre_frequency /= times;
        large.separation *= times;
        large.height *= times;
        for (Slab& slab : large.ground.slabs) {
            slab.thickness *= times;
            slab.material.inputs[Input::conductivity] /= times;
        }
        for (RoundTarget& t : large.targets) {
            t.x *= times;
            t.depth *= times;
            t.radius *= times;
            if (t.wall) t.wall->thickness *= times;
        }
        large.sampling.first *= times;
        large.sampling.step *= times;
        large.sampling.window *= times;
        const Section a = section_of(s), b = section_of(large);
        const auto scaled = [](std::vector<double> values) {
            for (double& v : values) v *= times;
            return values;
        };
        CHECK(apart(scaled(b.targets), a.targets) < 5e-3);  // a cut-off may fall on the other side of a whole number
        CHECK(apart(scaled(b.direct), a.direct) < 2e-3);
        if (s.ground.slabs.size() > 1) CHECK(apart(scaled(b.layers), a.layers) < 2e-3);
    });
}

TEST_CASE("Tighter cut-offs hardly change what random scenes answer") {
    // Root mean square of the whole section, 150 such scenes: half within 0.2 %, nine of ten within 0.4 %.
    for_scenes(13, 8, true, [](const Scene& s) {
        const Section plain = section_of(s), careful = section_of(s, 8.0);
        CHECK(apart(plain.targets, careful.targets) < 1e-2);
        CHECK(apart(plain.direct, careful.direct) < 3e-3);
        if (s.ground.slabs.size() > 1) CHECK(apart(plain.layers, careful.layers) < 5e-3);
    });
}

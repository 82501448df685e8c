#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <random>

#include "setting.hpp"
#include "survey/answers.hpp"

using namespace gg;

namespace {

using Random = std::mt19937;

/// Mostly sensible, at times extreme, at times no number at all.
double odd(Random& random, double typical) {
    std::uniform_real_distribution<double> unit(0.0, 1.0);
    const double u = unit(random);
    if (u < 0.7) return typical * (0.2 + 3.0 * unit(random));
    switch (static_cast<int>(unit(random) * 10.0)) {
        case 0:
            return std::numeric_limits<double>::quiet_NaN();
        case 1:
            return std::numeric_limits<double>::infinity();
        case 2:
            return -std::numeric_limits<double>::infinity();
        case 3:
            return 0.0;
        case 4:
            return -typical;
        case 5:
            return 1e300;
        case 6:
            return -1e300;
        case 7:
            return 1e-300;
        case 8:
            return typical * 1e6;
        default:
            return typical * 1e-6;
    }
}

Range odd_range(Random& random, double typical) {
    return {odd(random, 0.7 * typical), odd(random, typical), odd(random, 1.4 * typical)};
}

Plan odd_plan(Random& random) {
    const auto pick = [&](int n) { return static_cast<int>(random() % static_cast<unsigned>(n)); };
    Plan plan;
    const auto rows = catalogue();
    const int layers = pick(11);
    for (int i = 0; i < layers; ++i) {
        Layer layer;
        layer.matter = rows.empty() || pick(4) == 0 ? matter_of("own") : matter_of(rows[random() % rows.size()].id);
        if (pick(20) == 0) layer.matter.material = "no such thing";
        for (int k = 0; k < input_count; ++k) {
            Range& r = layer.matter.inputs[static_cast<Input>(k)];
            if (pick(3) == 0) r = odd_range(random, r.likely);
        }
        layer.thickness = odd_range(random, 0.5);
        plan.ground.push_back(layer);
    }
    Target& t = plan.target;
    t.shape = static_cast<TargetShape>(pick(3));
    t.filling = static_cast<Filling>(pick(7));
    t.size = odd(random, 0.1);
    t.depth = odd_range(random, 1.0);
    t.count = pick(4) == 0 ? pick(2000000000) - 1000000000 : 1 + pick(4);
    t.gap = odd(random, 0.4);
    t.length = odd(random, 10.0);
    t.bearing = odd(random, 1.0);
    Antenna& a = plan.antenna;
    a.pulse.family = pick(2) == 0 ? PulseFamily::ricker : PulseFamily::gaussian_derivative;
    a.pulse.centre_frequency = odd(random, 4e8);
    a.pulse.bandwidth = odd(random, 1.0);
    a.separation = odd(random, 0.2);
    a.height = pick(2) == 0 ? 0.0 : odd(random, 0.1);
    a.dynamic_range = odd(random, 120.0);
    a.channels = pick(4) == 0 ? pick(2000000000) - 1000000000 : 1 + pick(8);
    a.channel_spacing = odd(random, 0.1);
    plan.pass = {odd(random, 0.02), odd(random, 6e-8), pick(4) == 0 ? pick(2000000000) - 1000000000 : 64 + pick(1000),
                 pick(100), odd(random, 100.0)};
    const int corners = pick(9);
    plan.lanes.outline.clear();
    for (int i = 0; i < corners; ++i) plan.lanes.outline.push_back({odd(random, 10.0), odd(random, 10.0)});
    plan.lanes.spacing = odd(random, 0.5);
    plan.lanes.both_ways = pick(2) == 0;
    plan.lanes.bearing = odd(random, 1.0);
    plan.need = {odd(random, 0.1), odd(random, 1.0), odd(random, 0.3), odd(random, 0.05)};
    return plan;
}

bool all_finite(const std::vector<double>& v) {
    return std::all_of(v.begin(), v.end(), [](double x) { return std::isfinite(x); });
}

}  // namespace

TEST_CASE("no plan however odd gives a number that is not finite, an empty reason or a range out of order") {
    Random random(20240);
    for (int i = 0; i < 3000; ++i) {
        const Plan plan = odd_plan(random);
        const Answers answers = answers_for(plan);
        CAPTURE(i);
        bool whole = true;
        for (const Answer& a : answers.list) {
            bool fine = std::isfinite(a.likely.value) && std::isfinite(a.low) && std::isfinite(a.high) &&
                        !a.why.empty() && a.low <= a.likely.value && a.likely.value <= a.high;
            for (const Rule& r : a.rules) fine = fine && std::isfinite(r.value);
            for (const Mend& m : a.mends) fine = fine && std::isfinite(m.value);
            CHECK_MESSAGE(fine, a.key << " " << a.low << " " << a.likely.value << " " << a.high << " " << a.why);
            whole = whole && fine;
        }
        CHECK(answers.list.size() >= 26);
        const PulsePicture& pulse = answers.pulse;
        CHECK(all_finite(pulse.returned.values));
        CHECK(all_finite(pulse.samples.values));
        CHECK(all_finite(pulse.rebuilt));
        CHECK(all_finite(pulse.joined));
        CHECK(std::isfinite(pulse.window_depth));
        const PairPicture& pair = answers.pair;
        CHECK(all_finite(pair.response));
        CHECK(all_finite(pair.arrival_left));
        CHECK(all_finite(pair.alone_right));
        CHECK(std::isfinite(pair.dip));
        const BeamPicture& beam = answers.beam;
        CHECK(std::isfinite(beam.max_depth));
        for (const auto& arc : beam.arcs) {
            for (const Crossing& p : arc.points) CHECK((std::isfinite(p.x) && std::isfinite(p.depth)));
        }
        for (const SitePoint& p : answers.lanes.hits) CHECK((std::isfinite(p.x) && std::isfinite(p.y)));
        CHECK(std::isfinite(answers.lanes.distance));
        if (!whole) break;
    }
}

TEST_CASE("a ground of one layer with every single field set to nonsense in turn still answers") {
    const Plan plan = three_layers();
    for (const Field& field : fields_of(plan)) {
        for (double x : {field.low, field.high}) {
            Plan edge = plan;
            if (!set_number(edge, field.key, x).empty()) continue;
            for (const Answer& a : answers_for(edge).list) {
                CHECK_MESSAGE(std::isfinite(a.likely.value), field.key << " " << a.key);
                CHECK_MESSAGE(a.low <= a.likely.value, field.key << " " << a.key);
                CHECK_MESSAGE(a.likely.value <= a.high, field.key << " " << a.key);
            }
        }
    }
}

#include "wave/layers.hpp"

#include <algorithm>
#include <random>

#include "near.hpp"
#include "wave/catalogue.hpp"

using namespace gg;
using namespace gg::test;

namespace {

Slab slab_of(double permittivity, double thickness, double conductivity = 0.0) {
    return {constant_material(permittivity, conductivity), thickness};
}

/// Travel time of a broken line that crosses the boundaries at the given places.
double time_of(const std::vector<double>& across, const std::vector<double>& h, const std::vector<double>& v) {
    double time = 0.0;
    for (std::size_t i = 0; i < h.size(); ++i) time += std::hypot(across[i + 1] - across[i], h[i]) / v[i];
    return time;
}

/// Smallest time over all broken lines, by golden section on one crossing after the other until nothing moves: knows
/// nothing of Snell's law.
double fastest(const std::vector<double>& h, const std::vector<double>& v, double offset) {
    std::vector<double> across(h.size() + 1);
    for (std::size_t i = 0; i < across.size(); ++i)
        across[i] = offset * static_cast<double>(i) / static_cast<double>(h.size());
    double best = time_of(across, h, v);
    for (int round = 0; round < 4000; ++round) {
        for (std::size_t i = 1; i + 1 < across.size(); ++i) {
            double a = across[i - 1], b = across[i + 1];
            const auto at = [&](double x) {
                return std::hypot(x - across[i - 1], h[i - 1]) / v[i - 1] + std::hypot(across[i + 1] - x, h[i]) / v[i];
            };
            for (int k = 0; k < 45; ++k) {
                const double c = b - (b - a) * 0.618033988749895, d = a + (b - a) * 0.618033988749895;
                if (at(c) < at(d))
                    b = d;
                else
                    a = c;
            }
            across[i] = 0.5 * (a + b);
        }
        const double time = time_of(across, h, v);
        if (best - time < 1e-16 * best && round > 20) break;
        best = std::min(best, time);
    }
    return best;
}

}  // namespace

TEST_CASE("a depth on a boundary belongs to the layer above it") {
    const Stack stack{{slab_of(4, 0.3), slab_of(9, 0.5), slab_of(16, 1)}};
    CHECK(layer_at(stack, 0.0) == 0);
    CHECK(layer_at(stack, 0.3) == 0);
    CHECK(layer_at(stack, 0.3001) == 1);
    CHECK(layer_at(stack, 0.8) == 1);
    CHECK(layer_at(stack, 99.0) == 2);
    CHECK(top_of(stack, 0) == 0.0);
    CHECK(top_of(stack, 2) == doctest::Approx(0.8));
}

TEST_CASE("time down and depth after are each other's inverse, and add up layer by layer") {
    const Stack stack{{slab_of(4, 0.3, 0.01), slab_of(9, 0.5), slab_of(16, 1)}};
    const double slow4 = 1.0 / plane_wave(stack.slabs[0].material, 4e8).speed, slow9 = 3.0 / speed_of_light;
    CHECK(time_down(stack, 0.5, 4e8).value == doctest::Approx(0.3 * slow4 + 0.2 * slow9).epsilon(1e-12));
    for (const double depth : {0.0, 0.1, 0.3, 0.31, 0.8, 2.5}) {
        const Value time = time_down(stack, depth, 4e8);
        CHECK(time.ok());
        CHECK(depth_after(stack, time.value, 4e8).value == doctest::Approx(depth).epsilon(1e-12));
    }
    CHECK(effective_speed(stack, 0.0, 4e8).value == doctest::Approx(1.0 / slow4));
    CHECK(effective_speed(stack, 0.5, 4e8).value == doctest::Approx(0.5 / (0.3 * slow4 + 0.2 * slow9)));
}

TEST_CASE("the three layers of the Dix round trip take 20, 25 and 50 ns, and 0.0778947 m/ns on the whole") {
    const auto of_speed = [](double v) { return std::pow(speed_of_light / v, 2); };
    const Stack stack{{slab_of(of_speed(0.12e9), 1.2), slab_of(of_speed(0.08e9), 1.0), slab_of(of_speed(0.06e9), 1.5)}};
    CHECK(2.0 * time_down(stack, 1.2, 1e8).value == printed(20e-9));
    CHECK(2.0 * time_down(stack, 2.2, 1e8).value == printed(45e-9));
    CHECK(2.0 * time_down(stack, 3.7, 1e8).value == printed(95e-9));
    CHECK(effective_speed(stack, 3.7, 1e8).value == printed(0.0778947e9));
}

TEST_CASE("no broken line is faster than the ray, and the ray is as fast as the fastest") {
    std::mt19937 dice(5);
    const auto any = [&](double low, double high) { return std::uniform_real_distribution<double>(low, high)(dice); };
    for (int scene = 0; scene < 30; ++scene) {
        const int count = 1 + scene % 4;
        Stack stack;
        std::vector<double> h, v;
        const double height = scene % 3 == 0 ? 0.0 : any(0.01, 0.4);
        if (height > 0.0) {
            h.push_back(height);
            v.push_back(speed_of_light);
        }
        double depth = 0.0;
        for (int i = 0; i < count; ++i) {
            const double K = any(2.0, 40.0), thickness = any(0.05, 0.8);
            stack.slabs.push_back(slab_of(K, thickness));
            const double crossed = i + 1 == count ? 0.7 * thickness : thickness;
            h.push_back(crossed);
            v.push_back(speed_of_light / std::sqrt(K));
            depth += crossed;
        }
        const double offset = any(0.0, 3.0);
        const Ray ray = ray_to(stack, height, offset, depth, 4e8);
        CAPTURE(scene);
        CHECK(ray.issue == Issue::none);
        CHECK(ray.time == doctest::Approx(fastest(h, v, offset)).epsilon(1e-12).scale(1e-15));
    }
}

TEST_CASE("Snell's constant holds along the ray, which starts at the antenna and ends at the target") {
    const Stack stack{{slab_of(9, 0.3), slab_of(4, 0.4), slab_of(25, 1)}};
    const Ray ray = ray_to(stack, 0.2, -1.5, 1.0, 4e8);
    REQUIRE(ray.points.size() == 5);
    CHECK(ray.points.front().depth == -0.2);
    CHECK(ray.points[1].depth == doctest::Approx(0.0));
    CHECK(ray.points.back().x == -1.5);
    CHECK(ray.points.back().depth == 1.0);
    const double slowness[] = {1.0, 3.0, 2.0, 5.0};
    double time = 0.0, length = 0.0;
    for (std::size_t i = 0; i + 1 < ray.points.size(); ++i) {
        const double dx = ray.points[i + 1].x - ray.points[i].x, dz = ray.points[i + 1].depth - ray.points[i].depth;
        const double stretch = std::hypot(dx, dz);
        CHECK(slowness[i] / speed_of_light * std::abs(dx) / stretch == doctest::Approx(ray.slowness).epsilon(1e-9));
        time += stretch * slowness[i] / speed_of_light;
        length += stretch;
    }
    CHECK(ray.time == doctest::Approx(time).epsilon(1e-12));
    CHECK(ray.length == doctest::Approx(length).epsilon(1e-12));
}

TEST_CASE("a ray far to the side through a thin fast layer still lands on its target") {
    const Stack stack{{slab_of(30, 1.0), slab_of(30, 1)}};
    for (const double height : {1e-6, 1e-3, 0.1}) {
        for (const double offset : {1e-9, 1.0, 50.0, 1e4}) {
            const Ray ray = ray_to(stack, height, offset, 0.9, 4e8);
            const Crossing surface = ray.points[1];
            CHECK(ray.slowness * speed_of_light < 1.0 + 1e-12);
            const double in_ground = std::hypot(offset - surface.x, 0.9), in_air = std::hypot(surface.x, height);
            CHECK(ray.time == doctest::Approx((in_air + std::sqrt(30.0) * in_ground) / speed_of_light).epsilon(1e-9));
        }
    }
}

TEST_CASE("antenna and target on the surface, straight down, and nonsense") {
    const Stack stack{{slab_of(9, 0.3), slab_of(4, 1)}};
    CHECK(ray_to(stack, 0.0, 0.6, 0.0, 4e8).time == doctest::Approx(1.8 / speed_of_light));
    CHECK(ray_to(stack, 0.0, 0.0, 0.5, 4e8).time == doctest::Approx(time_down(stack, 0.5, 4e8).value));
    CHECK(ray_to(stack, 0.0, 0.0, 0.0, 4e8).time == 0.0);
    const double nan = std::nan("");
    CHECK(ray_to(stack, nan, 0.0, 0.5, 4e8).issue == Issue::not_a_number);
    CHECK(ray_to(stack, 0.0, nan, 0.5, 4e8).issue == Issue::not_a_number);
    CHECK(ray_to(stack, 0.0, 0.0, -1.0, 4e8).issue == Issue::out_of_range);
    CHECK(ray_to({}, 0.0, 0.0, 1.0, 4e8).issue == Issue::out_of_range);
    CHECK(std::isfinite(ray_to(stack, 0.0, 1.0, 0.5, nan).time));
    CHECK_FALSE(time_down(stack, nan, 4e8).ok());
    CHECK_FALSE(depth_after(stack, -1e-9, 4e8).ok());
    CHECK_FALSE(effective_speed({}, 1.0, 4e8).ok());
    CHECK(layer_at({}, 1.0) == 0);
}

TEST_CASE("a path through a material outside its band says so") {
    const CatalogueRow* table = find_material("concrete-table");
    REQUIRE(table != nullptr);
    const Stack stack{{slab_of(9, 0.3), {table->material, 1.0}}};
    CHECK(time_down(stack, 0.2, 4e8).issue == Issue::none);
    CHECK(time_down(stack, 0.5, 4e8).issue == Issue::outside_band);
    CHECK(ray_to(stack, 0.0, 0.4, 0.5, 4e8).issue == Issue::outside_band);
    CHECK(time_down(stack, 0.5, 2e9).issue == Issue::none);
}

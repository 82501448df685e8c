#include "survey/plan.hpp"

#include <doctest/doctest.h>

using namespace gg;

TEST_CASE("a catalogue row as matter gives back the row's material at its likely values") {
    for (const CatalogueRow& row : catalogue()) {
        const Matter matter = matter_of(row.id);
        CHECK(matter.material == row.id);
        CHECK_MESSAGE(permittivity(material_of(matter), 400e6).value == permittivity(row.material, 400e6).value,
                      row.id);
    }
}

TEST_CASE("each input of a material is taken from the end asked for") {
    Matter matter = matter_of("wet-clay");
    matter.inputs[Input::permittivity] = {10, 20, 30};
    matter.inputs[Input::conductivity] = {0.01, 0.02, 0.03};
    Inputs<int> ends{};
    ends[Input::permittivity] = 1;
    ends[Input::conductivity] = -1;
    const Material material = material_of(matter, ends);
    CHECK(material.inputs[Input::permittivity] == 30);
    CHECK(material.inputs[Input::conductivity] == 0.01);
    CHECK(material_of(matter).inputs[Input::permittivity] == 20);
}

TEST_CASE("an unknown material is own numbers, permittivity 9") {
    const Matter matter = matter_of("cheese");
    CHECK(matter.material == "own");
    CHECK(permittivity(material_of(matter), 400e6).value.real() == 9.0);
}

TEST_CASE("the likely ground has the plan's layers, and a plan without layers still has a ground") {
    Plan plan;
    plan.ground = {Layer{matter_of("asphalt"), {0.1, 0.2, 0.3}}, Layer{matter_of("wet-clay"), exactly(1.0)}};
    const Stack stack = likely_stack(plan);
    REQUIRE(stack.slabs.size() == 2);
    CHECK(stack.slabs[0].thickness == 0.2);
    plan.ground.clear();
    CHECK(likely_stack(plan).slabs.size() == 1);
}

TEST_CASE("what a target holds: metal, air at 1, water near 80, chosen material as given") {
    Target target;
    target.filling = Filling::metal;
    CHECK(filling_of(target).model == Model::metal);
    for (const Filling empty : {Filling::air, Filling::plastic_air}) {
        target.filling = empty;
        CHECK(permittivity(filling_of(target), 400e6).value == Complex(1.0, 0.0));
    }
    for (const Filling full : {Filling::water, Filling::plastic_water}) {
        target.filling = full;
        // 78 to 88 over 0 to 25 degrees Celsius at low frequency; common knowledge, no single source.
        CHECK(permittivity(filling_of(target), 400e6).value.real() > 78);
        CHECK(permittivity(filling_of(target), 400e6).value.real() < 88);
    }
    target.filling = Filling::own;
    target.own = matter_of("granite");
    CHECK(filling_of(target) == material_of(matter_of("granite")));
    target.filling = Filling::concrete;
    CHECK(filling_of(target) == material_of(matter_of("concrete-damp")));
}

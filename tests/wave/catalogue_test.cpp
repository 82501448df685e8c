#include "wave/catalogue.hpp"

#include <algorithm>
#include <set>

#include "near.hpp"
#include "wave/plane_wave.hpp"

using namespace gg;

namespace {

/// The row's material with the inputs of `corner`'s bits at the high end, the others at the low end.
Material corner_of(const CatalogueRow& row, unsigned corner) {
    Material material = row.material;
    for (int i = 0, bit = 0; i < input_count; ++i) {
        const Input input = static_cast<Input>(i);
        if (!takes(material.model, input)) continue;
        material.inputs[input] = (corner >> bit++) & 1U ? row.ranges[input].high : row.ranges[input].low;
    }
    return material;
}

unsigned corners(Model model) {
    unsigned count = 1;
    for (int i = 0; i < input_count; ++i)
        if (takes(model, static_cast<Input>(i))) count *= 2;
    return count;
}

}  // namespace

TEST_CASE("the catalogue holds at least 30 materials, each with its own id and a source") {
    REQUIRE(catalogue().size() >= 30);
    std::set<std::string> ids, names;
    for (const CatalogueRow& row : catalogue()) {
        CAPTURE(row.id);
        CHECK(ids.insert(row.id).second);
        CHECK(names.insert(row.name).second);
        CHECK(row.source.size() > 10);
        CHECK(std::all_of(row.id.begin(), row.id.end(),
                          [](char c) { return (c >= 'a' && c <= 'z') || (c >= '0' && c <= '9') || c == '-'; }));
        // What was not looked up is said in words too.
        CHECK(row.from_memory == (row.source.find("from memory") != std::string::npos));
    }
    for (const char* id : {"concrete-dry", "concrete-damp", "concrete-wet", "dry-sand", "moist-sand",  "wet-sand",
                           "silty-sand",   "wet-clay",      "dry-clay",     "asphalt",  "brick",       "limestone",
                           "granite",      "peat",          "ice",          "snow",     "fresh-water", "sea-water",
                           "air",          "loam",          "silt",         "gravel",   "plastic",     "metal"}) {
        CAPTURE(id);
        CHECK(find_material(id) != nullptr);
    }
    CHECK(find_material("unobtainium") == nullptr);
    CHECK(find_material("metal")->material.model == Model::metal);
}

TEST_CASE("every material is passive and finite at every corner of its ranges, from 10 MHz to 5 GHz") {
    for (const CatalogueRow& row : catalogue()) {
        CAPTURE(row.id);
        for (unsigned corner = 0; corner < corners(row.material.model); ++corner) {
            for (double f = 1e7; f < 5.1e9; f *= 1.6) {
                const Permittivity p = permittivity(corner_of(row, corner), f);
                CAPTURE(f);
                CHECK(p.value.real() >= 1.0);
                CHECK(p.value.imag() <= 0.0);
                CHECK(std::isfinite(std::abs(p.value)));
                CHECK(p.issue != Issue::out_of_range);
                CHECK(p.issue != Issue::not_a_number);
                const PlaneWave wave = plane_wave(p, f);
                CHECK(wave.speed > 0.0);
                CHECK(wave.speed <= speed_of_light * (1.0 + 1e-12));
                CHECK(wave.attenuation >= 0.0);
            }
        }
    }
}

TEST_CASE("no model fails within its own band at any corner of a catalogue row") {
    for (const CatalogueRow& row : catalogue()) {
        CAPTURE(row.id);
        for (unsigned corner = 0; corner < corners(row.material.model); ++corner)
            for (double f = std::max(row.material.band_low, 1e7); f <= std::min(row.material.band_high, 5e9); f *= 1.3)
                CHECK(permittivity(corner_of(row, corner), f).issue == Issue::none);
    }
}

TEST_CASE("rows from Davis and Annan 1989 lie within that table's ranges") {
    const std::pair<const char*, const char*> pairs[] = {{"limestone", "limestone"},
                                                         {"shale", "shale"},
                                                         {"granite", "granite"},
                                                         {"wet-clay", "clay"},
                                                         {"dry-clay", "clay"},
                                                         {"silt", "silt"},
                                                         {"saturated-sand-table", "saturated sand"},
                                                         {"rock-salt", "dry salt"}};
    const auto table = test::reference_table("davis_annan");
    for (const auto& pair : pairs) {
        const char *id = pair.first, *name = pair.second;
        const CatalogueRow* row = find_material(id);
        REQUIRE(row != nullptr);
        const auto published =
            std::find_if(table.begin(), table.end(), [&](const auto& r) { return r.text("material") == name; });
        REQUIRE(published != table.end());
        CAPTURE(id);
        const double slack = 1.0 + 1e-9;
        // Dry clay may be drier than the table's lowest permittivity of 5.
        CHECK(row->ranges[Input::permittivity].low * slack >=
              (*published)["K_low"] - (std::string(id) == "dry-clay" ? 1 : 0));
        CHECK(row->ranges[Input::permittivity].high <= (*published)["K_high"] * slack);
        CHECK(row->ranges[Input::conductivity].low * 1e3 * slack >= (*published)["sigma_low"]);
        CHECK(row->ranges[Input::conductivity].high * 1e3 <= (*published)["sigma_high"] * slack);
    }
}

TEST_CASE("more water makes every soil slower") {
    for (const char* id : {"sandy-loam", "loam", "silty-clay-soil", "silt-loam", "mineral-soil"}) {
        const CatalogueRow* row = find_material(id);
        REQUIRE(row != nullptr);
        Material material = row->material;
        double before = 1.0;
        for (double water = 0.05; water <= 0.45; water += 0.05) {
            material.inputs[Input::water] = water;
            const double e = permittivity(material, 5e8).value.real();
            CHECK(e > before);
            before = e;
        }
    }
}

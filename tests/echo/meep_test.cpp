#include <doctest/doctest.h>

#include <algorithm>
#include <fstream>
#include <nlohmann/json.hpp>
#include <sstream>
#include <string>

#include "echo/scene.hpp"

// What a general-purpose finite-difference time-domain solver, MEEP (Oskooi et al. 2010, Computer Physics
// Communications 181(3)), recorded for the scenes of tests/reference/meep/scenes.json at two grids; record.py makes the
// recordings afresh.

using namespace gg;
using nlohmann::json;

namespace {

const std::string folder = GG_SOURCE_DIR "/tests/reference/meep/";

json read(const std::string& name) {
    std::ifstream file(folder + name);
    return json::parse(file, nullptr, false);
}

Material material_from(const json& j) {
    if (!j.value("metal", false)) return constant_material(j.at("permittivity"), j.at("conductivity"));
    Material metal;
    metal.model = Model::metal;
    return metal;
}

Scene scene_from(const json& j) {
    Scene s;
    s.pulse.centre_frequency = j.at("peak_frequency");
    s.polarisation = j.at("polarisation") == "along" ? Polarisation::along : Polarisation::across;
    s.height = j.at("height");
    for (const json& layer : j.at("layers"))
        s.ground.slabs.push_back({material_from(layer), layer.value("thickness", 0.0)});
    for (const json& t : j.at("targets")) {
        RoundTarget target{t.at("x"), t.at("depth"), t.at("radius"), material_from(t), {}};
        if (t.contains("wall")) target.wall = RoundTarget::Wall{t["wall"].at("thickness"), material_from(t["wall"])};
        s.targets.push_back(target);
    }
    s.sampling.samples = j.at("samples");
    s.sampling.window = s.sampling.samples * j.at("step").get<double>();
    return s;
}

/// Columns after the first, one after another.
std::vector<double> recorded(const std::string& name, std::size_t samples) {
    std::ifstream file(folder + "traces/" + name);
    std::string line;
    std::getline(file, line);
    std::vector<std::vector<double>> columns;
    while (std::getline(file, line)) {
        std::istringstream cells(line);
        std::string cell;
        std::getline(cells, cell, ',');
        for (std::size_t c = 0; std::getline(cells, cell, ','); ++c) {
            if (c == columns.size()) columns.emplace_back();
            columns[c].push_back(std::strtod(cell.c_str(), nullptr));
        }
    }
    std::vector<double> all;
    for (const auto& column : columns) {
        CHECK(column.size() == samples);
        all.insert(all.end(), column.begin(), column.end());
    }
    return all;
}

/// All positions of the first separation, then of the next.
std::vector<double> computed(const json& j) {
    Scene s = scene_from(j);
    std::vector<double> all;
    for (const double separation : j.at("separations")) {
        s.separation = separation;
        for (const double x : j.at("positions")) {
            s.sampling.first = x;
            const Section section = section_of(s);
            CHECK(section.reason == "");
            const std::vector<double>& trace = j.at("wanted") == "layers" ? section.layers : section.targets;
            all.insert(all.end(), trace.begin(), trace.end());
        }
    }
    return all;
}

double dot(const std::vector<double>& a, const std::vector<double>& b) {
    double sum = 0.0;
    for (std::size_t i = 0; i < a.size(); ++i) sum += a[i] * b[i];
    return sum;
}

}  // namespace

TEST_CASE(
    "The section agrees with a general-purpose finite-difference solver to 1 % or to that solver's own grid error") {
    const json scenes = read("scenes.json"), recordings = read("recorded.json");
    REQUIRE(scenes.is_object());
    REQUIRE(recordings.is_object());
    int compared = 0;
    for (const json& j : scenes.at("scenes")) {
        const std::string name = j.at("name");
        if (!recordings.contains(name)) continue;
        const std::vector<double> theirs = recorded(name + "_fine.csv", j.at("samples")), ours = computed(j);
        CAPTURE(name);
        REQUIRE(theirs.size() == ours.size());
        const double scale = dot(ours, theirs) / dot(ours, ours);
        std::vector<double> rest(ours.size());
        for (std::size_t i = 0; i < rest.size(); ++i) rest[i] = theirs[i] - scale * ours[i];
        const double off = std::sqrt(dot(rest, rest) / dot(theirs, theirs));
        const json& r = recordings.at(name);
        const double grid = r.value("rms_error_of_fine", r.at("rms_between_grids").get<double>());
        MESSAGE(name << ": " << 100.0 * off << " % RMS, the solver's own error " << 100.0 * grid << " %, scale "
                     << scale);
        CHECK(off < std::max(0.01, grid));
        CHECK(std::fabs(scale - 1.0) < std::max(0.02, grid));  // both are V/m for 1 A: no factor should be needed
        ++compared;
    }
    CHECK(compared >= 6);
}

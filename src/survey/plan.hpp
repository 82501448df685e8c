#pragma once
/// A Plan is everything a person enters, nothing else. SI units, angles in radians.
#include <string>
#include <vector>

#include "wave/catalogue.hpp"
#include "wave/pulse.hpp"

namespace gg {

/// A material by its catalogue id, with the inputs that its model takes. "own" is Model::constant with own numbers.
struct Matter {
    std::string material = "own";
    Inputs<Range> inputs{};
    bool operator==(const Matter&) const = default;
};

struct Layer {
    Matter matter;
    Range thickness = exactly(1.0);  ///< m, > 0; the last layer's is ignored: it goes down without end
    bool operator==(const Layer&) const = default;
};

enum class TargetShape : std::uint8_t { round, flat, compact };
enum class Filling : std::uint8_t { metal, plastic_air, plastic_water, concrete, air, water, own };

struct Target {
    TargetShape shape = TargetShape::round;
    Filling filling = Filling::plastic_water;
    Matter own;                  ///< used where filling is Filling::own
    double size = 0.11;          ///< m: diameter, or thickness when flat
    Range depth = exactly(0.9);  ///< m, surface to the target's top
    int count = 2;               ///< how many of them side by side, 1 to 12
    double gap = 0.4;            ///< m, centre to centre
    double length = 20.0;        ///< m, along its axis
    double bearing = 0.0;        ///< rad, clockwise from the site's north (+y), 0 to pi
    bool operator==(const Target&) const = default;
};

struct Antenna {
    PulseShape pulse;
    double separation = 0.16;      ///< m, transmitter to receiver
    double height = 0.0;           ///< m, above the surface
    double dynamic_range = 120.0;  ///< dB, of one trace
    int channels = 1;              ///< side by side
    double channel_spacing = 0.0;  ///< m, across the direction of travel
    bool operator==(const Antenna&) const = default;
};

/// What is keyed into the instrument.
struct Pass {
    double step = 0.02;         ///< m between traces
    double window = 60e-9;      ///< s
    int samples = 512;          ///< per trace
    int stacks = 1;             ///< traces averaged into one
    double trace_rate = 100.0;  ///< traces per second, before stacking
    bool operator==(const Pass&) const = default;
};

struct SitePoint {
    double x = 0.0, y = 0.0;  ///< m, east and north
    bool operator==(const SitePoint&) const = default;
};

/// What is walked.
struct Lanes {
    std::vector<SitePoint> outline{{0, 0}, {20, 0}, {20, 15}, {0, 15}};  ///< simple polygon
    double spacing = 0.5;    ///< m between lines (between swaths' same channel for an array)
    bool both_ways = false;  ///< a second set of lines at right angles
    double bearing = 0.0;    ///< rad, direction of travel clockwise from north
    bool operator==(const Lanes&) const = default;
};

/// What the client asks for; 0 where nothing is asked.
struct Need {
    double smallest = 0.0;        ///< m
    double deepest = 0.0;         ///< m
    double closest = 0.0;         ///< m, centre to centre
    double depth_accuracy = 0.0;  ///< m
    bool operator==(const Need&) const = default;
};

struct Plan {
    std::string name = "New plan";
    std::string note;
    std::vector<Layer> ground;  ///< at least one, from the top; at most 8
    Target target;
    Antenna antenna;
    Pass pass;
    Lanes lanes;
    Need need;
    bool operator==(const Plan&) const = default;
};

/// The material of `matter` with each input at its low, likely or high end (-1, 0, +1 per input).
Material material_of(const Matter& matter, const Inputs<int>& ends = {});
/// A catalogue row as Matter, all its inputs at the row's ranges; an unknown id gives "own" with permittivity 9.
Matter matter_of(std::string_view catalogue_id);
/// The ground at its likely values.
Stack likely_stack(const Plan& plan);
/// Material inside the target; metal gives Model::metal.
Material filling_of(const Target& target);

}  // namespace gg

#pragma once
/// Plan in, Answers out. Pure; nothing throws, nothing is NaN.
#include <optional>
#include <string>
#include <vector>

#include "survey/fields.hpp"
#include "survey/plan.hpp"

namespace gg {

enum class Grade : std::uint8_t { none, good, thin, poor };
enum class Group : std::uint8_t { wave, patch, pulse, downwards, sideways, smallest, pass, lanes };

/// A change of one field that would better an answer: a button.
struct Mend {
    std::string words;   ///< "Step 1 cm"
    std::string field;   ///< key for set_number
    double value = 0.0;  ///< SI
};

/// The published rule of thumb that stands beside the computed value.
struct Rule {
    std::string name;    ///< "half a wavelength"
    double value = 0.0;  ///< same unit as the answer
    std::string source;  ///< paper or standard; "common practice, no source"
};

/// Likely value and the ends over all that the plan holds possible.
struct Spread {
    Value likely;
    double low = 0.0, high = 0.0;
};

struct Answer {
    std::string key;   ///< machine name, stable: "apart.sideways", "layer.0.speed", "pass.step"
    std::string name;  ///< "Told apart sideways"
    Group group = Group::wave;
    Quantity quantity = Quantity::none;
    Value likely;                  ///< with its issue
    double low = 0.0, high = 0.0;  ///< over the ranges of the inputs; low <= likely <= high
    Grade grade = Grade::none;
    std::string why;      ///< one sentence a foreman would say; never empty
    std::string formula;  ///< how it was computed, and the paper
    std::vector<Rule> rules;
    std::vector<Mend> mends;
};

// ---- what the pictures read: computed here so that drawing holds no physics ----

struct BeamPicture {
    struct Arc {
        std::vector<Crossing> points;  ///< one wavefront, left to right, m
    };
    std::vector<Arc> arcs;              ///< one wavelength apart along the axis, refracted
    std::vector<Ray> edge;              ///< the two outer rays of the lit patch, antenna to target's depth
    double patch_along = 0.0;           ///< m, half-width of the first Fresnel zone along the line
    double patch_across = 0.0;          ///< m, half-width across it
    double wavelength_at_target = 0.0;  ///< m
    double max_depth = 0.0;             ///< m, a sensible bottom for the cut
};

struct PulsePicture {
    Signal sent;                  ///< centred on its own time zero
    Signal returned;              ///< true pulse on the window's time axis, scaled to peak 1
    Signal samples;               ///< as the pass digitises it
    std::vector<double> rebuilt;  ///< band-limited reconstruction, on `returned`'s grid
    std::vector<double> joined;   ///< straight lines between the samples, on `returned`'s grid
    double amplitude = 0.0;       ///< of the returned pulse, of a sent peak of 1
    double window_depth = 0.0;    ///< m, depth the window's end reaches
};

struct PairPicture {
    enum class Verdict : std::uint8_t { one, merging, apart };
    Verdict verdict = Verdict::one;
    double first = 0.0;                               ///< m, position of the left target (the right one at first + gap)
    std::vector<double> positions;                    ///< m along the line
    std::vector<double> arrival_left, arrival_right;  ///< s, first arrival of each target alone, per position
    std::vector<double> response;                     ///< combined envelope along the line at the apex's row, peak 1
    std::vector<double> alone_left, alone_right;      ///< of each alone, same scale
    double dip = 0.0;                                 ///< depth of the dip between the peaks, 0..1 of the lower peak
};

struct LanesPicture {
    struct Line {
        SitePoint from, to;
        bool second_way = false;
    };
    std::vector<Line> lines;           ///< lines walked, in walking order (up, then back)
    std::vector<SitePoint> hits;       ///< where the target is crossed
    SitePoint target_from, target_to;  ///< the long target, cut to the site
    struct Gap {
        SitePoint from, to;
    };
    std::vector<Gap> gaps;  ///< stretches of the target farther apart than an interpolated picture can bridge
    double distance = 0.0;  ///< m walked
};

struct Answers {
    std::vector<Answer> list;
    std::vector<std::string> faults;  ///< from faults_of(plan): what makes no sense, and what would
    BeamPicture beam;
    PulsePicture pulse;
    PairPicture pair;
    LanesPicture lanes;

    const Answer* find(std::string_view key) const;
};

/// All answers for a plan. Keys that always exist (the rest come per layer):
///   layer.N.speed .wavelength .attenuation .time .skin        per layer at the antenna's centre frequency
///   target.time .loss .width .frequency                        at the target
///   patch.along .patch.across                                  lit patch's full widths at the target's depth
///   apart.down .apart.sideways                                 smallest separation, centre to centre
///   smallest                                                   smallest size
///   pass.step .pass.window .pass.interval .pass.samples        largest step, window and interval needed, samples
///   pass.hits .pass.per_cycle .pass.error .pass.reach          what the chosen ones give
///   lanes.between_hits .lanes.hits .lanes.picture .lanes.swath
/// What settle() (survey/section.hpp) adds: apart.focused .apart.above .apart.through
/// Aim: under 1 ms natively.
Answers answers_for(const Plan& plan);

std::string_view word_for(Grade grade);                   ///< "good", "thin", "poor", ""
std::string_view word_for(PairPicture::Verdict verdict);  ///< "one", "merging", "apart"

}  // namespace gg

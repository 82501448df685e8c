#pragma once
/// The plan as the full-wave engine takes it, and what its section tells. Pure, like answers_for(), and apart from it
/// because it takes milliseconds, not microseconds.
#include <optional>
#include <string>
#include <vector>

#include "echo/apart.hpp"
#include "echo/focus.hpp"
#include "survey/answers.hpp"

namespace gg {

enum class Detail : std::uint8_t {
    coarse,  ///< while something is dragged: fewer traces and less time than full, to 1 % of the strongest echo
    full,    ///< as keyed in, over the stretch and the time that hold the hyperbolas
    exact    ///< as keyed in: every trace of that stretch, the whole window
};

/// Most targets that a section holds; of more, those in the middle are taken.
constexpr int most_section_targets = 6;

/// The plan's targets in its likely ground, sampled as its pass has it.
/// Targets stand side by side at the plan's gap about x = 0, the two in the middle first in the list. Plastic pipes
/// have a wall of the catalogue's "plastic", 5 % of the diameter thick (common practice, no source). A compact target
/// is taken for a round one without end across the line; a flat one cannot be: no targets. The line reaches past the
/// outermost target by 1.2 times the depth of its axis, an aperture of 50 degrees to either side, rounded up so that it
/// stands still while something is dragged. It has at most 512 traces: a step much finer than the shortest quarter wave
/// is thinned first (which loses nothing), then the line is cut. Detail::exact does neither, up to 4096 traces.
Scene scene_for(const Plan& plan, Detail detail = Detail::full, Polarisation polarisation = Polarisation::along);

/// Why there is no section of this plan, in one sentence (numbers as in survey/words.hpp); empty when there is.
std::string section_fault(const Plan& plan);

/// section_of(scene_for(...)); refused with section_fault()'s sentence.
Section section_for(const Plan& plan, Detail detail = Detail::full, Polarisation polarisation = Polarisation::along);

/// What of a section is looked at; the direct wave is two to five powers of ten above the rest.
struct SectionParts {
    bool targets = true, layers = true, direct = false, noise = false;
    bool operator==(const SectionParts&) const = default;
};
/// The sum of those parts, traces x samples, trace after trace; empty when the section was refused.
std::vector<double> record_of(const Section& section, SectionParts parts);

/// First arrivals from a target of the plan's size and depth at a distance along the line, s; one per distance (m).
std::vector<double> arrivals_at(const Plan& plan, const std::vector<double>& distances);

/// How echoes are made comparable along a trace before they are looked at.
enum class Gain : std::uint8_t {
    recorded,  ///< none
    even,      ///< what the ground took on the way there and back at the centre frequency, and the spreading, is given
               ///< back: equal targets look equally strong at any depth
    strong     ///< as even, and faint echoes are raised: the square root of the strength
};
/// Factor of each sample for Gain::even: (d / d0) exp(2 sum alpha h) down to where the sample's time leads, 1 at the
/// depth d0 of the targets' tops, at most 80 dB above its least. Spreading: an echo of a round target falls with d in
/// two dimensions.
std::vector<double> even_gain(const Scene& scene);

/// Which way to turn the antenna.
struct Turning {
    double along_db = 0.0;  ///< dB by which the field along the target gives the stronger echo; negative: weaker
    Polarisation better = Polarisation::along;
    std::string words;  ///< one sentence; empty where there is no section
};
/// Echo energy of one target from straight above, over the spectrum that reaches it, field along against field across:
/// the sums sum_n (-1)^n s_n over all orders of its scattering coefficients. The antenna's own pattern straight down is
/// the same either way.
Turning turning_for(const Plan& plan);

/// Two neighbours of the plan as measured in the section, not by rule.
struct Separation {
    Dip raw, focused;                ///< at the plan's own gap
    Value least_raw, least_focused;  ///< m, smallest gap at which they are two; Issue as in smallest_gap()
    /// The same gaps over the grounds and depths that the plan holds possible; smallest distance, centre to centre, of
    /// two such targets one above the other; smallest diameter from which top and bottom of one are two echoes. m
    Spread range_raw, range_focused, above, through;
    /// How far the measuring has come: the raw dip at the plan's gap; all that is raw; all at the likely ground and
    /// depth; all.
    enum class Known : std::uint8_t { dip, raw, likely, all };
    Known known = Known::likely;
};
Separation separation_for(const Plan& plan, Polarisation polarisation = Polarisation::along);
/// The raw dip alone, from no more of the section than it takes: the record's own traces up to a gap from the middle,
/// to 1 % of the strongest echo. A fifth to a half of a section's time.
Dip raw_dip(const Scene& scene);
/// Measures what is still missing to Known::all: everything again in each of the plan's grounds and depths (as
/// answers_for() takes them), and downwards. Up to ten times as long as the likely ones alone.
void add_ranges(Separation& out, const Plan& plan, Polarisation polarisation = Polarisation::along);
/// One half of it: the dip and the least gap of one reading.
void read_separation(const Scene& scene, const Section& section, Reading reading, Separation& out);

/// Apart: in the raw section; merging: only once focused; one: in neither. As long as only the raw section is known,
/// merging: there is a dip, too shallow to count.
/// @param gap  m, the plan's own
PairPicture::Verdict verdict_of(const Separation& separation, double gap);

/// Puts what was measured in the place of what travel times tell: the answer "apart.sideways" becomes the least gap in
/// the raw section (the travel-time value stands beside it as a rule), "apart.focused" is added, and the verdict of the
/// pair picture follows. Until their ranges are measured, too, the ends keep the ratio to the likely value that the
/// travel times give; with them come "apart.above" and, where there is an inside, "apart.through".
/// Does nothing where the least gaps are not known yet, or when done already.
void settle(Answers& answers, const Plan& plan, const Separation& separation);
/// answers_for(plan), settled wherever the plan has a section: the full reckoning, for files. About fifty sections'
/// time.
Answers settled_answers_for(const Plan& plan);

/// How much a section asks for, 1 and up; time goes with it, roughly. (Periods of the centre frequency in the
/// record)^2, because frequencies and antenna positions both go with its length, times the work on the targets' orders.
double section_effort(const Scene& scene);

/// The plan with a neighbour put beside a lone target: what Pair asks about.
Plan as_pair(Plan plan);

/// All that Pair shows of a plan's section, in the order in which it is worth computing: each step costs more than the
/// one before, so that a program that must not stand still takes one a frame.
struct PairSection {
    Detail detail = Detail::full;
    Scene scene;
    Section section;
    std::vector<double> arrivals;  ///< s, from a target at distance i * scene.sampling.step, i = 0 .. traces
    std::vector<double> gain;      ///< even_gain(scene)
    Turning turning;
    Image focused;                         ///< no rows until add_focused()
    std::vector<double> focused_gain;      ///< of each row: that of the sample whose echo comes from there
    bool focused_before = false;           ///< the focused picture is still that of an earlier state of the plan
    std::optional<Separation> separation;  ///< none until something was measured; all of it by add_separation()
};
PairSection pair_section(const Plan& plan, Detail detail, Polarisation polarisation);
/// Noise goes into the image as it is in the record; the layers' echoes do not.
void add_focused(PairSection& pair);
void add_separation(PairSection& pair, const Plan& plan);

}  // namespace gg

#pragma once
/// What Pair says: as measured in the section once it is, by the rules of the answers until then.
#include <string>

#include "draw/figure.hpp"

namespace gg {

struct PairWords {
    const Plan& plan;
    const Answers& answers;
    const PairSection* seen;  ///< null: no section
    UnitSystem units;

    bool measured() const;  ///< the verdict is; the least gaps may be still to come
    /// Measured: verdict_of() of the section that is shown.
    PairPicture::Verdict verdict() const;
    double gap() const;            ///< m, that the verdict is about
    std::string sentence() const;  ///< "Two at 0.40 m show as two."
    std::string least() const;     ///< "They part from 0.30 m raw, 0.13 m focused."
    std::string least_in_brief() const;
    std::string rules() const;    ///< what the rules say of the smallest gap, beside what was measured
    std::string turning() const;  ///< which way to turn the antenna; empty without a section
    std::string turning_in_brief() const;
    /// All of it, for screen readers and files.
    std::string description() const;
};

std::string gain_words(Gain gain);

}  // namespace gg

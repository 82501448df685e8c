#include "survey/parts.hpp"
#include "survey/words.hpp"

namespace gg {

void add_smallest(const Setting& setting, Answers& answers) {
    const double tenth = 0.1, quarter = 0.25;
    Spread s = spread_over(setting.cases, [&](const Case& c) { return quarter * c.wave().wavelength; });
    const double finest = spread_over(setting.cases, [&](const Case& c) { return tenth * c.wave().wavelength; }).low;
    s.low = finest;
    Answer& a = add(answers, Group::smallest, "smallest", "Smallest size", Quantity::length, s);
    const double lambda = setting.likely().wave().wavelength;
    a.formula =
        "A quarter of the wavelength at the target; low end a tenth. A rule of size only: what the target is made of "
        "and how much echo is left are not in it.";
    a.rules = {{"a tenth of the wavelength, at best", tenth * lambda, "common practice, no source"},
               {"a quarter of the wavelength, to rely on", quarter * lambda, "common practice, no source"}};
    const double asked = setting.plan.need.smallest, size = asked > 0.0 ? asked : setting.plan.target.size;
    a.grade = size >= a.high ? Grade::good : size >= tenth * lambda ? Grade::thin : Grade::poor;
    a.why = "By practice a thing shows from " + token(tenth * lambda, Quantity::length) + " at best and " +
            token(quarter * lambda, Quantity::length) + " to rely on; " +
            (asked > 0.0 ? "asked for are " : "the target has ") + token(size, Quantity::length) +
            ". This is not yet a count of how much echo is left.";
    if (a.grade != Grade::good) {
        const double want = keyed_up(setting.frequency() * a.high / size);
        a.mends.push_back({"Centre frequency " + token(want, Quantity::frequency), "antenna.frequency", want});
    }
}

}  // namespace gg

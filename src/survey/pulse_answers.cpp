#include <cmath>

#include "survey/parts.hpp"
#include "survey/words.hpp"

namespace gg {

void add_pulse(const Setting& setting, Answers& answers) {
    const Case& c = setting.likely();
    const double f = setting.frequency();

    Answer& time = add(answers, Group::pulse, "target.time", "Time to the target and back", Quantity::time,
                       spread_over(setting.cases, [](const Case& k) { return k.arrival(); }));
    time.why = "The target's top answers " + token(time.likely.value, Quantity::time) + " after the pulse left.";
    time.formula =
        "Refracted path from transmitter to receiver by the target's top, phase speeds at the centre frequency.";
    time.rules = {{"2 depth / speed, straight down", 2.0 * c.depth / c.mean_speed(), "textbook"}};

    Answer& loss = add(answers, Group::pulse, "target.loss", "Loss in the ground", Quantity::loss,
                       spread_over(setting.cases, [](const Case& k) { return k.echo.loss; }));
    const double range = setting.plan.antenna.dynamic_range, left = range - loss.likely.value;
    loss.grade = loss.high <= 0.5 * range ? Grade::good : loss.likely.value <= 0.7 * range ? Grade::thin : Grade::poor;
    loss.why = left > 0.0 ? "The ground takes " + token(loss.likely.value, Quantity::loss) + " down and back; " +
                                token(left, Quantity::loss) +
                                " of the antenna's range are left for spreading and for what the target throws back."
                          : "The ground takes " + token(loss.likely.value, Quantity::loss) +
                                " down and back, more than the antenna's " + token(range, Quantity::loss) +
                                ": nothing comes back that can be seen.";
    loss.formula =
        "Envelope peak of the pulse after the exact two-way path, against the one sent; spreading and interfaces not "
        "in it.";
    double narrow = 0.0, top = 0.0;
    for (int i = 0; i <= c.layer; ++i) {
        const double h = i == c.layer ? c.depth - top : c.ground->stack.slabs[i].thickness;
        narrow += 2.0 * h * c.ground->waves[i].attenuation_db();
        top += h;
    }
    loss.rules = {{"2 x attenuation at the centre frequency x depth", narrow, "textbook"}};

    Answer& width = add(answers, Group::pulse, "target.width", "Pulse width at the target", Quantity::time,
                        spread_over(setting.cases, [](const Case& k) { return k.echo.width; }));
    width.why = "The echo is " + token(width.likely.value, Quantity::time) +
                " long when it comes back; two echoes closer than that run together.";
    width.formula = "Full width of the returned pulse's envelope at half its peak.";
    width.rules = {{"1 / centre frequency", 1.0 / f, "Annan & Cosway 1992, from memory"}};

    Answer& centre = add(answers, Group::pulse, "target.frequency", "Centre frequency on return", Quantity::frequency,
                         spread_over(setting.cases, [](const Case& k) { return k.echo.frequency; }));
    const double share = c.echo.frequency / c.ground->spectrum.sent->mean_frequency;
    centre.why = share < 0.95 ? "The ground eats the fine part first: what comes back is centred on " +
                                    token(centre.likely.value, Quantity::frequency) + ", " +
                                    token(share, Quantity::fraction) + " of what was sent."
                              : "The pulse comes back nearly as it was sent, centred on " +
                                    token(centre.likely.value, Quantity::frequency) + ".";
    centre.formula = "Mean of the returned amplitude spectrum.";
    centre.rules = {
        {"as sent, mean of the sent spectrum", c.echo.frequency / share, "Wang 2015 for the Ricker wavelet"}};
}

}  // namespace gg

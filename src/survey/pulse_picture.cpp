#include <algorithm>
#include <cmath>

#include "survey/parts.hpp"
#include "survey/rebuild.hpp"

namespace gg {

void draw_pulse(const Setting& setting, Answers& answers) {
    PulsePicture& picture = answers.pulse;
    const Case& c = setting.likely();
    const Pass& pass = setting.plan.pass;
    const EchoPulse& echo = c.echo;
    picture.sent = sent_pulse(setting.plan.antenna.pulse);
    picture.amplitude = std::pow(10.0, -echo.loss / 20.0);

    const double arrival = c.arrival();
    const double interval = pass.window / pass.samples;
    picture.samples.start = 0.0;
    picture.samples.step = interval;
    picture.samples.values.assign(pass.samples, 0.0);
    const int from =
        static_cast<int>(std::clamp((arrival - echo.reach) / interval, 0.0, static_cast<double>(pass.samples)));
    const int to =
        static_cast<int>(std::clamp((arrival + echo.reach) / interval + 1.0, 0.0, static_cast<double>(pass.samples)));
    for (int i = from; i < to; ++i) picture.samples.values[i] = echo.trace(i * interval - arrival);

    const double before = std::min(echo.reach, 1.5 * echo.lead), after = std::min(echo.reach, 1.5 * echo.tail);
    constexpr int points = 160;
    picture.returned.start = arrival - before;
    picture.returned.step = (before + after) / points;
    picture.returned.values.resize(points + 1);
    picture.rebuilt.resize(points + 1);
    picture.joined.resize(points + 1);
    const std::vector<double>& s = picture.samples.values;
    for (int k = 0; k <= points; ++k) {
        const double t = picture.returned.time(k);
        picture.returned.values[k] = echo.trace(t - arrival);
        const double place = t / interval;
        // After the window's end there is nothing to rebuild from.
        if (!(place >= 0.0 && place <= pass.samples - 1.0)) continue;
        const int i = std::min(static_cast<int>(place), pass.samples - 2);
        const double u = place - i;
        picture.joined[k] = (1.0 - u) * s[i] + u * s[i + 1];
        // Enough neighbours that what is left out is under a thousandth of the peak.
        const int a = std::max(from, i - 300), b = std::min(to, i + 300);
        if (a < b) picture.rebuilt[k] = sinc_sum({s.data() + a, s.data() + b}, place - a);
    }
}

}  // namespace gg

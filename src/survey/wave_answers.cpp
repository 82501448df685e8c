#include <string>

#include "survey/parts.hpp"
#include "survey/words.hpp"

namespace gg {
namespace {

std::string layer_name(const Setting& setting, std::size_t i) {
    const CatalogueRow* row = find_material(setting.plan.ground[i].matter.material);
    return row != nullptr ? row->name : "Own material";
}

/// Ends over the grounds only: a layer's numbers do not hang on the target's depth.
template <class F>
Spread over_grounds(const Setting& setting, F f) {
    Spread s = just(f(*setting.cases.grounds.front()));
    for (const auto& g : setting.cases.grounds) {
        const double x = f(*g);
        if (x < s.low) s.low = x;
        if (x > s.high) s.high = x;
    }
    return s;
}

}  // namespace

void add_wave(const Setting& setting, Answers& answers) {
    const std::size_t layers = setting.plan.ground.size();
    for (std::size_t i = 0; i < layers; ++i) {
        const std::string key = "layer." + std::to_string(i) + ".", name = layer_name(setting, i);
        const bool last = i + 1 == layers;
        const PlaneWave& w = setting.likely().ground->waves[i];
        const std::size_t from = answers.list.size();

        Answer& speed = add(answers, Group::wave, key + "speed", name + ": speed", Quantity::speed,
                            over_grounds(setting, [&](const Ground& g) { return g.waves[i].speed; }));
        speed.why = "The wave runs through it at " + token(speed.likely.value, Quantity::speed) + ", " +
                    token(speed.likely.value / speed_of_light, Quantity::fraction) + " of its speed in air.";
        speed.formula = "Phase speed from the complex permittivity, exact.";
        const double eps =
            permittivity(setting.likely().ground->stack.slabs[i].material, setting.frequency()).value.real();
        speed.rules.push_back(
            {"c / sqrt(relative permittivity), loss left out", speed_of_light / std::sqrt(eps), "textbook"});

        Answer& length = add(answers, Group::wave, key + "wavelength", name + ": wavelength", Quantity::length,
                             over_grounds(setting, [&](const Ground& g) { return g.waves[i].wavelength; }));
        length.why = "One wave is " + token(length.likely.value, Quantity::length) +
                     " long in it; nothing much finer than a quarter of that shows.";
        length.formula = "Phase speed over centre frequency.";

        Answer& loss = add(answers, Group::wave, key + "attenuation", name + ": attenuation", Quantity::attenuation,
                           over_grounds(setting, [&](const Ground& g) { return g.waves[i].attenuation; }));
        loss.why = "Every metre of it takes " + token(loss.likely.value, Quantity::attenuation) +
                   " from the wave, down and again on the way back.";
        loss.formula = "Imaginary part of the complex wavenumber, exact.";
        const Permittivity p = permittivity(setting.likely().ground->stack.slabs[i].material, setting.frequency());
        const double sigma = -p.value.imag() * 2.0 * pi * setting.frequency() * vacuum_permittivity;
        loss.rules.push_back({"1636 conductivity / sqrt(permittivity), for low loss",
                              low_loss_attenuation_db(sigma, p.value.real()) / decibel_per_neper,
                              "Annan's low-loss form, from memory; constant derived"});

        Answer& time = add(answers, Group::wave, key + "time", name + ": two-way time", Quantity::time,
                           over_grounds(setting, [&](const Ground& g) {
                               return 2.0 * (last ? 1.0 : g.stack.slabs[i].thickness) / g.waves[i].speed;
                           }));
        time.why = (last ? "Each metre of it" : "This layer") + std::string(" takes ") +
                   token(time.likely.value, Quantity::time) + " down and back.";
        time.formula = last ? "2 x 1 m / speed." : "2 x thickness / speed.";

        Answer& skin = add(answers, Group::wave, key + "skin", name + ": skin depth", Quantity::length,
                           over_grounds(setting, [&](const Ground& g) { return g.waves[i].skin_depth; }));
        skin.why = skin.likely.value >= 1e6 ? "It takes nothing from the wave: there is no skin depth to speak of."
                                            : "After " + token(skin.likely.value, Quantity::length) +
                                                  " in it the wave is down to 37 percent.";
        skin.formula = "1 / attenuation.";
        if (skin.likely.value < 1e6) {
            skin.rules.push_back(
                {"reach of about three skin depths", 3.0 * skin.likely.value, "geoscixyz GPG, GPR survey data"});
        }

        if (w.issue == Issue::none) continue;
        for (std::size_t k = from; k < answers.list.size(); ++k) {
            answers.list[k].likely.issue = w.issue == Issue::outside_band ? Issue::outside_band : Issue::model_fails;
            answers.list[k].why += " ";
            answers.list[k].why += sentence(w.issue);
        }
    }
}

}  // namespace gg

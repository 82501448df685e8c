#include "wave/material.hpp"

#include <algorithm>

#include "wave/models.hpp"

namespace gg {
namespace {

constexpr std::size_t index(Input input) { return static_cast<std::size_t>(input); }

struct InputRow {
    std::string_view key;
    double low, likely, high;
};
constexpr InputRow input_rows[input_count] = {{"permittivity", 1.0, 9.0, 100.0}, {"conductivity", 0.0, 0.01, 10.0},
                                              {"water", 0.0, 0.2, 1.0},          {"temperature", -60.0, 15.0, 60.0},
                                              {"salinity", 0.0, 0.3, 40.0},      {"sand", 0.0, 0.4, 1.0},
                                              {"clay", 0.0, 0.2, 1.0},           {"density", 50.0, 1500.0, 2600.0},
                                              {"porosity", 0.0, 0.35, 1.0},      {"saturation", 0.0, 0.5, 1.0},
                                              {"grain", 2.0, 4.6, 12.0},         {"pore_conductivity", 0.0, 0.05, 10.0},
                                              {"cementation", 1.2, 1.5, 2.6}};

using I = Input;
struct ModelRow {
    std::string_view key;
    unsigned inputs;  // one bit each
};
constexpr unsigned bits(std::initializer_list<Input> inputs) {
    unsigned all = 0;
    for (const Input input : inputs) all |= 1U << index(input);
    return all;
}
constexpr ModelRow model_rows[] = {
    {"constant", bits({I::permittivity, I::conductivity})},
    {"building", 0},
    {"water", bits({I::temperature, I::salinity})},
    {"ice", bits({I::temperature})},
    {"snow", bits({I::temperature, I::density})},
    {"topp", bits({I::water, I::conductivity})},
    {"peplinski", bits({I::water, I::temperature, I::sand, I::clay, I::density})},
    {"soil_p527", bits({I::water, I::temperature, I::sand, I::clay})},
    {"mixture", bits({I::porosity, I::saturation, I::grain, I::temperature, I::pore_conductivity, I::cementation})},
    {"metal", 0}};

/// The inputs that the model takes, each moved into its legal range.
Inputs<double> legal(const Material& material, Issue& issue) {
    Inputs<double> in = material.inputs;
    for (std::size_t i = 0; i < input_count; ++i) {
        if (!takes(material.model, static_cast<Input>(i))) continue;
        double& x = in[static_cast<Input>(i)];
        const InputRow& row = input_rows[i];
        if (x >= row.low && x <= row.high) continue;
        issue = worse(issue, std::isfinite(x) ? Issue::out_of_range : Issue::not_a_number);
        x = std::isnan(x) ? row.likely : std::clamp(x, row.low, row.high);
    }
    if (takes(material.model, I::clay) && in[I::sand] + in[I::clay] > 1.0) {
        if (in[I::sand] + in[I::clay] > 1.0 + 1e-9) issue = worse(issue, Issue::out_of_range);
        in[I::clay] = 1.0 - in[I::sand];
    }
    return in;
}

Permittivity raw(const Material& material, const Inputs<double>& in, double f) {
    switch (material.model) {
        case Model::constant:
            return {{in[I::permittivity], -models::conduction_loss(in[I::conductivity], f)}, Issue::none};
        case Model::building:
            return models::building(material.coefficients, f);
        case Model::water:
            return models::salt_water(in[I::temperature], in[I::salinity], f);
        case Model::ice:
            return models::pure_ice(in[I::temperature], f);
        case Model::snow:
            return models::dry_snow(in[I::density], in[I::temperature], f);
        case Model::topp:
            return models::topp(in[I::water], in[I::conductivity], f);
        case Model::peplinski:
            return models::peplinski({in[I::water], in[I::sand], in[I::clay], in[I::density] * 1e-3},
                                     models::free_water(in[I::temperature]), f);
        case Model::soil_p527:
            return models::soil_p527({in[I::water], in[I::sand], in[I::clay], 0.0}, in[I::temperature], f);
        case Model::mixture:
            return models::mixture({in[I::porosity], in[I::saturation], in[I::grain], in[I::temperature],
                                    in[I::pore_conductivity], in[I::cementation]},
                                   f);
        case Model::metal:
            return {{1.0, -models::conduction_loss(1e7, f)}, Issue::none};  // P.2040's row for metal
    }
    return {};
}

}  // namespace

Material air() { return constant_material(1.0, 0.0); }

Material constant_material(double permittivity, double conductivity) {
    Material material;
    material.inputs[I::permittivity] = permittivity;
    material.inputs[I::conductivity] = conductivity;
    return material;
}

Permittivity permittivity(const Material& material, double frequency) {
    if (!std::isfinite(frequency)) return {{1.0, 0.0}, Issue::not_a_number};
    if (!(frequency > 0.0)) return {{1.0, 0.0}, Issue::out_of_range};
    Issue issue = Issue::none;
    const Inputs<double> in = legal(material, issue);
    Permittivity result = raw(material, in, frequency);
    if (!(frequency >= material.band_low && frequency <= material.band_high)) issue = worse(issue, Issue::outside_band);
    issue = worse(issue, result.issue);
    double real = result.value.real(), loss = -result.value.imag();
    // 1e-9: rounding of a mixture that is all air.
    if (!(real >= 1.0 - 1e-9 && loss >= 0.0 && std::isfinite(real) && std::isfinite(loss)))
        issue = worse(issue, Issue::model_fails);
    real = std::isfinite(real) ? std::max(real, 1.0) : 1.0;
    loss = std::isfinite(loss) ? std::max(loss, 0.0) : 0.0;
    return {{real, -loss}, issue};
}

bool takes(Model model, Input input) {
    return (model_rows[static_cast<std::size_t>(model)].inputs >> index(input)) & 1U;
}

std::string_view key_of(Input input) { return input_rows[index(input)].key; }
std::string_view key_of(Model model) { return model_rows[static_cast<std::size_t>(model)].key; }
Range legal_range(Input input) {
    const InputRow& row = input_rows[index(input)];
    return {row.low, row.likely, row.high};
}

}  // namespace gg

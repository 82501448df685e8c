#include "wave/catalogue.hpp"

#include <nlohmann/json.hpp>
#include <optional>

#include "wave/embedded.hpp"

namespace gg {
namespace {

using Json = nlohmann::json;

template <class Enum>
std::optional<Enum> named(std::string_view key, int count) {
    for (int i = 0; i < count; ++i)
        if (key_of(static_cast<Enum>(i)) == key) return static_cast<Enum>(i);
    return {};
}

constexpr int model_count = static_cast<int>(Model::metal) + 1;

std::optional<Texture> texture_named(std::string_view key) {
    constexpr std::string_view keys[] = {"plain",  "dots",  "coarse-dots", "dashes", "triangles",
                                         "blocks", "waves", "crosses",     "flakes", "grass"};
    for (std::size_t i = 0; i < std::size(keys); ++i)
        if (keys[i] == key) return static_cast<Texture>(i);
    return {};
}

std::string text(const Json& row, const char* key) {
    const auto found = row.find(key);
    return found != row.end() && found->is_string() ? found->get<std::string>() : std::string{};
}

bool numbers(const Json& array, std::span<double> into) {
    if (!array.is_array() || array.size() != into.size()) return false;
    for (std::size_t i = 0; i < into.size(); ++i) {
        if (!array[i].is_number()) return false;
        into[i] = array[i].get<double>();
    }
    return true;
}

/// Every input the model takes, and no other, each low <= likely <= high within its legal range.
bool read_inputs(const Json& inputs, CatalogueRow& row) {
    if (!inputs.is_object()) return false;
    std::size_t wanted = 0;
    for (int i = 0; i < input_count; ++i) wanted += takes(row.material.model, static_cast<Input>(i)) ? 1 : 0;
    if (inputs.size() != wanted) return false;
    for (const auto& [key, value] : inputs.items()) {
        const std::optional<Input> input = named<Input>(key, input_count);
        double x[3];
        if (!input || !takes(row.material.model, *input) || !numbers(value, x)) return false;
        const Range legal = legal_range(*input);
        if (!(legal.low <= x[0] && x[0] <= x[1] && x[1] <= x[2] && x[2] <= legal.high)) return false;
        row.ranges[*input] = {x[0], x[1], x[2]};
        row.material.inputs[*input] = x[1];
    }
    return true;
}

std::optional<CatalogueRow> read_row(const Json& json) {
    if (!json.is_object()) return {};
    CatalogueRow row;
    row.id = text(json, "id");
    row.name = text(json, "name");
    row.group = text(json, "group");
    row.source = text(json, "source");
    const std::optional<Model> model = named<Model>(text(json, "model"), model_count);
    const std::optional<Texture> texture = texture_named(text(json, "texture"));
    const auto memory = json.find("from_memory");
    const auto band = json.find("band_hz");
    if (row.id.empty() || row.name.empty() || row.group.empty() || row.source.empty() || !model || !texture ||
        memory == json.end() || !memory->is_boolean() || band == json.end())
        return {};
    row.from_memory = memory->get<bool>();
    row.texture = *texture;
    row.material.model = *model;
    double ends[2];
    if (!numbers(*band, ends) || !(ends[0] >= 0.0 && ends[0] < ends[1])) return {};
    row.material.band_low = ends[0];
    row.material.band_high = ends[1];
    if (*model == Model::building) {
        const auto coefficients = json.find("coefficients");
        if (coefficients == json.end() || !numbers(*coefficients, row.material.coefficients)) return {};
    }
    const auto inputs = json.find("inputs");
    if (!read_inputs(inputs == json.end() ? Json::object() : *inputs, row)) return {};
    return row;
}

std::vector<CatalogueRow> read(std::string_view bytes) {
    const Json json = Json::parse(bytes.begin(), bytes.end(), nullptr, false);
    if (!json.is_object()) return {};
    const auto materials = json.find("materials");
    if (materials == json.end() || !materials->is_array()) return {};
    std::vector<CatalogueRow> rows;
    for (const Json& material : *materials) {
        std::optional<CatalogueRow> row = read_row(material);
        if (!row) return {};
        rows.push_back(std::move(*row));
    }
    return rows;
}

}  // namespace

std::span<const CatalogueRow> catalogue() {
    static const std::vector<CatalogueRow> rows = read(embedded::catalogue_json());
    return rows;
}

const CatalogueRow* find_material(std::string_view id) {
    for (const CatalogueRow& row : catalogue())
        if (row.id == id) return &row;
    return nullptr;
}

}  // namespace gg

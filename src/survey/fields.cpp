#include "survey/fields.hpp"

#include <algorithm>
#include <array>
#include <cmath>

#include "survey/words.hpp"

namespace gg {

namespace {

enum class Part : std::uint8_t { low, likely, high };

struct Key {
    std::string_view base;
    Part part = Part::likely;
};

Key parse(std::string_view key) {
    if (key.ends_with(".low")) return {key.substr(0, key.size() - 4), Part::low};
    if (key.ends_with(".high")) return {key.substr(0, key.size() - 5), Part::high};
    return {key};
}

/// One row of the table. `step` 0: a twentieth of the value as it stands, rounded to 1, 2 or 5.
struct Row {
    std::string_view key, label;
    Quantity quantity = Quantity::none;
    double low = 0.0, high = 0.0, step = 0.0;
};

/// The extent of the outline along one axis, which is a number of the form but not of the file.
template <class Outline>
struct Extent {
    Outline& outline;
    double SitePoint::*axis;
};

struct InputRow {
    const char* label;
    Quantity quantity;
    double step;
};

// In the order of Input.
constexpr std::array<InputRow, input_count> input_rows{{{"Permittivity", Quantity::permittivity, 0.5},
                                                        {"Conductivity", Quantity::conductivity, 0.0},
                                                        {"Water content", Quantity::fraction, 0.01},
                                                        {"Temperature", Quantity::temperature, 1.0},
                                                        {"Salinity", Quantity::salinity, 0.5},
                                                        {"Sand", Quantity::fraction, 0.05},
                                                        {"Clay", Quantity::fraction, 0.05},
                                                        {"Dry density", Quantity::density, 50.0},
                                                        {"Porosity", Quantity::fraction, 0.01},
                                                        {"Pores filled", Quantity::fraction, 0.05},
                                                        {"Grains", Quantity::permittivity, 0.1},
                                                        {"Pore water", Quantity::conductivity, 0.0},
                                                        {"Cementation", Quantity::ratio, 0.1}}};

template <class M, class Visit>
void each_input(M& matter, const std::string& prefix, Visit& visit) {
    const CatalogueRow* known = find_material(matter.material);
    const Model model = known ? known->material.model : Model::constant;
    for (int i = 0; i < input_count; ++i) {
        const auto input = static_cast<Input>(i);
        if (!takes(model, input)) continue;
        const InputRow& row = input_rows[static_cast<std::size_t>(i)];
        const Range legal = legal_range(input);
        const std::string key = prefix + std::string(key_of(input));
        visit(Row{key, row.label, row.quantity, legal.low, legal.high, row.step}, matter.inputs[input]);
    }
}

/// The table: every number of a plan that the plan uses, in file order.
template <class P, class Visit>
void each_number(P& plan, Visit&& visit) {
    using Q = Quantity;
    for (std::size_t i = 0; i < plan.ground.size(); ++i) {
        const std::string prefix = "ground." + std::to_string(i) + ".";
        if (i + 1 < plan.ground.size()) {
            const std::string key = prefix + "thickness";
            visit(Row{key, "Thickness", Q::length, 0.001, 100.0, 0.0}, plan.ground[i].thickness);
        }
        each_input(plan.ground[i].matter, prefix, visit);
    }

    auto& target = plan.target;
    const bool flat = target.shape == TargetShape::flat;
    if (target.filling == Filling::own) each_input(target.own, "target.own.", visit);
    visit(Row{"target.size", flat ? "Thickness" : "Diameter", Q::small_length, 0.001, 10.0, 0.0}, target.size);
    visit(Row{"target.depth", "Depth to top", Q::length, 0.0, 100.0, 0.0}, target.depth);
    visit(Row{"target.count", "How many", Q::count, 1.0, 12.0, 1.0}, target.count);
    visit(Row{"target.gap", "Gap, centres", Q::length, 0.002, 100.0, 0.0}, target.gap);
    visit(Row{"target.length", "Length", Q::length, 0.01, 10000.0, 0.0}, target.length);
    visit(Row{"target.bearing", "Target bearing", Q::angle, 0.0, pi, pi / 36}, target.bearing);

    auto& antenna = plan.antenna;
    visit(Row{"antenna.frequency", "Frequency", Q::frequency, 10e6, 6e9, 0.0}, antenna.pulse.centre_frequency);
    if (antenna.pulse.family == PulseFamily::gaussian_derivative)
        visit(Row{"antenna.bandwidth", "Bandwidth", Q::ratio, 0.3, 1.6, 0.05}, antenna.pulse.bandwidth);
    visit(Row{"antenna.separation", "Separation", Q::small_length, 0.0, 10.0, 0.0}, antenna.separation);
    visit(Row{"antenna.height", "Height", Q::small_length, 0.0, 2.0, 0.01}, antenna.height);
    visit(Row{"antenna.dynamic_range", "Dynamic range", Q::loss, 40.0, 200.0, 1.0}, antenna.dynamic_range);
    visit(Row{"antenna.channels", "Channels", Q::count, 1.0, 64.0, 1.0}, antenna.channels);
    visit(Row{"antenna.channel_spacing", "Channel gap", Q::small_length, 0.0, 2.0, 0.005}, antenna.channel_spacing);

    auto& pass = plan.pass;
    visit(Row{"pass.step", "Step", Q::small_length, 0.001, 5.0, 0.0}, pass.step);
    visit(Row{"pass.window", "Time window", Q::time, 1e-9, 10e-6, 0.0}, pass.window);
    visit(Row{"pass.samples", "Samples", Q::count, 16.0, 16384.0, 16.0}, pass.samples);
    visit(Row{"pass.stacks", "Stacks", Q::count, 1.0, 32768.0, 1.0}, pass.stacks);
    visit(Row{"pass.trace_rate", "Trace rate", Q::rate, 0.1, 1e6, 0.0}, pass.trace_rate);

    auto& lanes = plan.lanes;
    auto& outline = lanes.outline;
    using Stretch = Extent<std::remove_reference_t<decltype(outline)>>;
    visit(Row{"lanes.spacing", "Line spacing", Q::length, 0.005, 100.0, 0.0}, lanes.spacing);
    visit(Row{"lanes.bearing", "Walk bearing", Q::angle, 0.0, 2 * pi, pi / 36}, lanes.bearing);
    visit(Row{"lanes.width", "Site width", Q::length, 0.1, 10000.0, 0.0}, Stretch{outline, &SitePoint::x});
    visit(Row{"lanes.height", "Site height", Q::length, 0.1, 10000.0, 0.0}, Stretch{outline, &SitePoint::y});

    auto& need = plan.need;
    visit(Row{"need.smallest", "Smallest", Q::small_length, 0.0, 10.0, 0.01}, need.smallest);
    visit(Row{"need.deepest", "Deepest", Q::length, 0.0, 100.0, 0.1}, need.deepest);
    visit(Row{"need.closest", "Closest pair", Q::length, 0.0, 100.0, 0.05}, need.closest);
    visit(Row{"need.depth_accuracy", "Depth within", Q::length, 0.0, 10.0, 0.01}, need.depth_accuracy);
}

/// `x` to 12 digits after its first; exact powers of ten reach to 1e22 in a double, so smaller numbers keep fewer.
double kept(double x) {
    constexpr double powers[] = {1e0,  1e1,  1e2,  1e3,  1e4,  1e5,  1e6,  1e7,  1e8,  1e9,  1e10, 1e11,
                                 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22};
    const double size = std::abs(x);
    if (!(size > 0 && size < 1e11)) return x;
    const auto places = static_cast<std::size_t>(std::clamp(11.0 - std::floor(std::log10(size)), 0.0, 22.0));
    return std::round(x * powers[places]) / powers[places];
}

/// `angle` in [0, turn), to 1e-9 of a degree.
double kept_angle(double angle, double turn) {
    constexpr double parts = 1e9;
    double degrees = std::round(angle * (180 / pi) * parts) / parts;
    const double whole = std::round(turn * (180 / pi));
    degrees -= whole * std::floor(degrees / whole);
    degrees = std::round(degrees * parts) / parts;
    return (degrees < whole ? degrees : 0.0) * (pi / 180);
}

double kept_as(const Row& row, double x) {
    if (!std::isfinite(x)) return x;
    return row.quantity == Quantity::angle ? kept_angle(x, row.high) : kept(x);
}

double get(const double& slot, Part) { return slot; }
double get(const int& slot, Part) { return slot; }
double get(const Range& slot, Part part) {
    return part == Part::low ? slot.low : part == Part::high ? slot.high : slot.likely;
}
template <class Outline>
double get(const Extent<Outline>& slot, Part) {
    if (slot.outline.empty()) return 0.0;
    const auto [least, most] = std::minmax_element(slot.outline.begin(), slot.outline.end(),
                                                   [&](auto& a, auto& b) { return a.*slot.axis < b.*slot.axis; });
    return kept(*most.*slot.axis - *least.*slot.axis);
}

std::string set(double& slot, const Row&, Part, double x) {
    slot = x;
    return {};
}
std::string set(int& slot, const Row&, Part, double x) {
    slot = static_cast<int>(std::lround(x));
    return {};
}
std::string set(Range& slot, const Row& row, Part part, double x) {
    const std::string middle = token(slot.likely, row.quantity);
    switch (part) {
        case Part::low:
            if (x > slot.likely)
                return std::string(row.label) + ": the low end cannot be above the likely value, " + middle + ".";
            slot.low = x;
            break;
        case Part::high:
            if (x < slot.likely)
                return std::string(row.label) + ": the high end cannot be below the likely value, " + middle + ".";
            slot.high = x;
            break;
        case Part::likely:
            slot = {std::min(slot.low, x), x, std::max(slot.high, x)};
            break;
    }
    return {};
}
std::string set(Extent<std::vector<SitePoint>> slot, const Row&, Part, double x) {
    const double now = get(slot, Part::likely);
    if (!(now > 0)) return "The site has no extent to stretch: give its outline first.";
    double least = slot.outline.front().*slot.axis;
    for (const SitePoint& p : slot.outline) least = std::min(least, p.*slot.axis);
    for (SitePoint& p : slot.outline) p.*slot.axis = kept(least + (p.*slot.axis - least) * (x / now));
    return {};
}

double tick(const Row& row, double value) {
    if (row.step > 0) return row.step;
    const double aim = std::max(std::abs(value), row.low + row.high * 1e-4) / 20;
    if (!(aim > 0 && std::isfinite(aim))) return row.high / 100;
    const double decade = std::pow(10.0, std::floor(std::log10(aim)));
    return kept(decade * (aim >= 5 * decade ? 5 : aim >= 2 * decade ? 2 : 1));
}

template <class Slot>
Field field_of(const Row& row, const Slot& slot) {
    return {std::string(row.key),
            std::string(row.label),
            row.quantity,
            row.low,
            row.high,
            tick(row, get(slot, Part::likely)),
            std::is_same_v<Slot, Range>,
            !std::is_arithmetic_v<Slot> && !std::is_same_v<Slot, Range>};
}

void rest(Matter& matter) {
    const CatalogueRow* row = find_material(matter.material);
    const Model model = row ? row->material.model : Model::constant;
    for (int i = 0; i < input_count; ++i)
        if (!takes(model, static_cast<Input>(i))) matter.inputs[static_cast<Input>(i)] = {};
}

struct Keep {
    void operator()(const Row& row, double& slot) const { slot = kept_as(row, slot); }
    void operator()(const Row& row, Range& slot) const {
        slot = {kept_as(row, slot.low), kept_as(row, slot.likely), kept_as(row, slot.high)};
    }
    void operator()(const Row&, int&) const {}
    void operator()(const Row&, Extent<std::vector<SitePoint>>) const {}
};

}  // namespace

std::vector<Field> fields_of(const Plan& plan) {
    std::vector<Field> fields;
    each_number(plan, [&](const Row& row, const auto& slot) { fields.push_back(field_of(row, slot)); });
    return fields;
}

std::optional<Field> find_field(const Plan& plan, std::string_view key) {
    const Key wanted = parse(key);
    std::optional<Field> found;
    each_number(plan, [&](const Row& row, const auto& slot) {
        if (row.key != wanted.base) return;
        Field field = field_of(row, slot);
        if (wanted.part == Part::likely || field.is_range) found = std::move(field);
    });
    return found;
}

std::optional<double> number_at(const Plan& plan, std::string_view key) {
    const Key wanted = parse(key);
    std::optional<double> found;
    each_number(plan, [&](const Row& row, const auto& slot) {
        const bool is_range = std::is_same_v<std::decay_t<decltype(slot)>, Range>;
        if (row.key == wanted.base && (wanted.part == Part::likely || is_range)) found = get(slot, wanted.part);
    });
    return found;
}

std::string set_number(Plan& plan, std::string_view key, double value) {
    const Key wanted = parse(key);
    std::string fault = "There is no field \"" + std::string(key) + "\" in this plan.";
    each_number(plan, [&](const Row& row, auto&& slot) {
        const bool is_range = std::is_same_v<std::decay_t<decltype(slot)>, Range>;
        if (row.key != wanted.base || (wanted.part != Part::likely && !is_range)) return;
        const double x = kept_as(row, value);
        if (x >= row.low && x <= row.high)
            fault = set(slot, row, wanted.part, x);
        else
            fault = std::string(row.label) + " must be from " + token(row.low, row.quantity) + " to " +
                    token(row.high, row.quantity) + ".";
    });
    return fault;
}

std::vector<std::string> number_faults(const Plan& plan) {
    std::vector<std::string> faults;
    each_number(plan, [&](const Row& row, const auto& slot) {
        using Slot = std::decay_t<decltype(slot)>;
        const auto fails = [&](Part part) { return !(get(slot, part) >= row.low && get(slot, part) <= row.high); };
        if (!std::is_arithmetic_v<Slot> && !std::is_same_v<Slot, Range>)
            return;  // faults_of looks at the outline itself
        const std::string what = std::string(row.label) + " (" + std::string(row.key) + ")";
        if (fails(Part::low) || fails(Part::likely) || fails(Part::high))
            faults.push_back(what + " must be from " + token(row.low, row.quantity) + " to " +
                             token(row.high, row.quantity) + ".");
        else if (get(slot, Part::low) > get(slot, Part::likely) || get(slot, Part::high) < get(slot, Part::likely))
            faults.push_back(what + ": its likely value must lie between its low and its high end.");
    });
    return faults;
}

Plan at_rest(Plan plan) {
    if (!plan.ground.empty()) plan.ground.back().thickness = Layer{}.thickness;
    for (Layer& layer : plan.ground) rest(layer.matter);
    rest(plan.target.own);
    if (plan.target.filling != Filling::own) plan.target.own = {};
    if (plan.antenna.pulse.family == PulseFamily::ricker) plan.antenna.pulse.bandwidth = PulseShape{}.bandwidth;
    for (SitePoint& p : plan.lanes.outline) p = {kept(p.x), kept(p.y)};
    each_number(plan, Keep{});
    return plan;
}

}  // namespace gg

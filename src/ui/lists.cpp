// Choosing from a list: what was used last comes first, then the groups.
#include <algorithm>

#include "ui/parts.hpp"

namespace gg {

struct Row {
    std::string id, name, heading;  // a heading stands above the row when it differs from the row before
};

static std::vector<Row> rows_of(const Session& session, const Choice& choice) {
    std::vector<Row> rows;
    const std::size_t dot = choice.key.rfind('.');
    const auto recent =
        session.preferences.recent.find(dot == std::string::npos ? choice.key : choice.key.substr(dot + 1));
    const bool material = choice.key.ends_with(".material");
    if (material && recent != session.preferences.recent.end())
        for (const std::string& id : recent->second)
            for (const Choice::Option& option : choice.options)
                if (option.id == id) rows.push_back({option.id, option.name, "Used last"});
    for (const Choice::Option& option : choice.options) {
        const CatalogueRow* row = material ? find_material(option.id) : nullptr;
        rows.push_back({option.id, option.name, row ? row->group : material ? "Own" : ""});
    }
    // Materials of one group stand together even where the catalogue's file has them apart.
    std::vector<std::string> order;
    for (const Row& row : rows)
        if (std::find(order.begin(), order.end(), row.heading) == order.end()) order.push_back(row.heading);
    const auto place = [&](const Row& row) { return std::find(order.begin(), order.end(), row.heading); };
    std::stable_sort(rows.begin(), rows.end(), [&](const Row& a, const Row& b) { return place(a) < place(b); });
    return rows;
}

/// "relative permittivity 15 to 26" of a material whose model takes one, else the model's own inputs go unsaid.
static std::string hint_of(const std::string& id) {
    const CatalogueRow* row = find_material(id);
    if (!row || !takes(row->material.model, Input::permittivity)) return {};
    const Range range = row->ranges[Input::permittivity];
    return say(range.low, Quantity::permittivity, UnitSystem::metric) +
           (range.high > range.low ? " to " + say(range.high, Quantity::permittivity, UnitSystem::metric) : "");
}

void list_ui(Screen& s, const std::string& key) {
    Session& session = s.session;
    const std::vector<Choice> choices = choices_of(session.plan);
    const auto found = std::find_if(choices.begin(), choices.end(), [&](const Choice& c) { return c.key == key; });
    if (found == choices.end()) return session.close();
    const std::vector<Row> rows = rows_of(session, *found);
    const std::string current = choice_at(session.plan, key).value_or("");
    const double row = s.areas.row + 4;
    const bool grouped = rows.size() > 8;
    const Box box =
        sheet_frame(s, found->label, s.areas.row + 24 + static_cast<double>(rows.size()) * row + (grouped ? 400 : 0));
    double y = s.begin_scroll("list." + key, {box.x - 8, box.y, box.width + 16, box.height}) + 6;
    std::string heading, chosen;
    for (const Row& option : rows) {
        if (option.heading != heading) {
            heading = option.heading;
            y += 8;
            s.line({box.x, y, box.width, 28}, heading, {s.small, s.colours.wave, Across::left, true});
            y += 30;
        }
        const Box line{box.x - 4, y, box.width + 8, row - 2};
        const bool is_current = option.id == current;
        const std::string id = (option.heading == "Used last" ? "recent." : "option.") + option.id;
        const Hit hit = s.control(id, "option", option.name, is_current ? "chosen" : "", line);
        s.backdrop(line, hit, is_current ? Look::chosen : Look::bare);
        const std::string hint = key.ends_with(".material") ? hint_of(option.id) : std::string();
        const double right = hint.empty() ? 0 : s.width_of("\u03b5 " + hint, s.small) + 8;
        s.label({line.x + 12, y, line.width - 24 - right, row - 2}, option.name,
                {s.text, s.colours.ink, Across::left, is_current});
        if (!hint.empty())
            s.line({line.right() - 12 - right, y, right, row - 2}, "\u03b5 " + hint,
                   {s.small, s.colours.soft_ink, Across::right});
        if (hit.pressed) chosen = option.id;
        y += row;
    }
    s.end_scroll(y + 12);
    if (chosen.empty()) return;
    session.history.settle(session.plan);
    session.act(session.choose(key, chosen));
    session.close();
}

}  // namespace gg

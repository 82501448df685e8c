// The inputs: one row per number or choice.
#include <algorithm>
#include <cmath>

#include "ui/parts.hpp"

namespace gg {

static std::string option_name(const Plan& plan, const Choice& choice) {
    const std::string id = choice_at(plan, choice.key).value_or("");
    for (const Choice::Option& option : choice.options)
        if (option.id == id) return option.name;
    return id;
}

bool lead_row(Screen& s, const std::string& id, std::string_view label, std::string_view words, Box box) {
    const Hit hit = s.control(id, "button", label, words, box);
    s.backdrop({box.x - 6, box.y + 2, box.width + 12, box.height - 4}, hit, Look::bare);
    const double left = words.empty() ? box.width - 24 : std::min(0.38 * box.width, s.width_of(label, s.text) + 12);
    s.label({box.x, box.y, left, box.height}, label, {s.text, words.empty() ? s.colours.wave : s.colours.ink});
    s.label({box.x + left, box.y, box.width - left - 26, box.height}, words, {s.text, s.colours.wave, Across::right});
    s.sign(Screen::Sign::more, {box.right() - 8, box.y + box.height / 2}, 13, s.colours.wave);
    return hit.pressed;
}

double choice_row(Screen& s, const Choice& choice, double x, double y, double width) {
    if (lead_row(s, "choice." + choice.key, choice.label, option_name(s.session.plan, choice),
                 {x, y, width, s.areas.row}))
        s.session.show(Sheet::Kind::list, choice.key);
    return y + s.areas.row;
}

double number_row(Screen& s, const std::string& key, double x, double y, double width) {
    Session& session = s.session;
    const auto field = find_field(session.plan, key);
    const auto value = number_at(session.plan, key);
    if (!field || !value) return y;
    const std::string id = "field." + key;
    const double row = s.areas.row, knob = std::max(row - 4, s.surface.touch ? 44.0 : 36.0), gap = 4;
    const double middle = std::clamp(0.3 * width, 84.0 * s.text / 16, 150.0 * s.text / 16);
    const Box more{x + width - knob, y + (row - knob) / 2, knob, knob};
    const Box middle_box{more.x - gap - middle, more.y, middle, knob};
    const Box less{middle_box.x - gap - knob, more.y, knob, knob};
    const Box name{x, y, std::max(0.0, less.x - x - 8), row};

    const auto low = number_at(session.plan, key + ".low"), high = number_at(session.plan, key + ".high");
    if (field->is_range && low && high) {
        const auto bare = [&](double v) { return shown_number(v, field->quantity, session.units(), true); };
        const std::string span = *high > *low ? bare(*low) + " \u2026 " + bare(*high) : "exactly";
        const Hit hit = s.control(id + ".range", "button", field->label + ": range", span, name);
        s.backdrop({name.x - 6, name.y + 2, name.width + 8, name.height - 4}, hit, Look::bare);
        const double step = std::min(row / 2, std::round(s.text * 1.25));
        s.line({name.x, y + row / 2 - step, name.width, step}, field->label);
        s.line({name.x, y + row / 2 - 1, name.width, step}, span, {s.small, s.colours.soft_ink});
        if (hit.pressed) {
            session.begin_edit(key + ".low");
            session.show(Sheet::Kind::keypad, key);
        }
    } else {
        s.label(name, field->label);
    }

    const auto nudge = [&](double by) {
        const double next = std::clamp(*value + by * field->step, field->low, field->high);
        const std::string fault = session.set(key, next);
        if (!fault.empty()) session.say_notice(session.words(fault));
        if (session.view.edit.key == key) session.begin_edit(key);
    };
    if (s.sign_button(id + ".less", Screen::Sign::minus, field->label + ": less", less, Look::quiet, true)) nudge(-1);
    if (s.sign_button(id + ".more", Screen::Sign::plus, field->label + ": more", more, Look::quiet, true)) nudge(+1);

    // While it is typed in on a desk, the value is a text field in its own place; on glass the keypad comes up.
    const bool typed_here = !s.surface.touch && session.view.edit.key == key &&
                            (session.view.sheets.empty() || session.view.sheets.back().kind != Sheet::Kind::keypad);
    const std::string shown = shown_number(*value, field->quantity, session.units());
    if (typed_here && s.topmost) {
        Edit& edit = session.view.edit;
        const bool begin = !edit.begun;
        edit.begun = true;
        std::string text = edit.text;
        s.marks.push_back({id, "spinbutton", field->label, text, meet(middle_box, s.visible()), true});
        const bool left = typing_field(s, id.c_str(), text, middle_box, true, begin);
        if (text != edit.text) edit.text = text, edit.fresh = false, edit.fault.clear();
        if (left && session.commit_edit()) edit = {};
    } else {
        const Hit hit = s.control(id, "spinbutton", field->label, shown, middle_box);
        const Point frame[] = {{middle_box.x, middle_box.y},
                               {middle_box.right(), middle_box.y},
                               {middle_box.right(), middle_box.bottom()},
                               {middle_box.x, middle_box.bottom()}};
        s.backdrop(middle_box, hit, Look::bare, 6);
        s.canvas().line(frame, {hit.hovered ? s.colours.wave : s.colours.hairline, 1}, true);
        s.line({middle_box.x + 4, middle_box.y, middle_box.width - 8, middle_box.height}, shown,
               {s.text, s.colours.ink, Across::centre});
        if (hit.pressed) {
            session.begin_edit(key);
            if (s.surface.touch) session.show(Sheet::Kind::keypad, key);
        }
    }
    y += row;
    if (session.view.edit.key == key && !session.view.edit.fault.empty() && typed_here)
        y = s.paragraph(x, y, width, session.view.edit.fault, {s.small, s.colours.warn}) + 4;
    return y;
}

/// What stands first in a key: its group.
static std::string group_of(const std::string& key) { return key.substr(0, key.find('.')); }

static double ground_ui(Screen& s, double x, double y, double width) {
    Session& session = s.session;
    const std::vector<Field> fields = fields_of(session.plan);
    const std::vector<Choice> choices = choices_of(session.plan);
    const int count = static_cast<int>(session.plan.ground.size());
    for (int i = 0; i < count; ++i) {
        const std::string prefix = "ground." + std::to_string(i) + ".";
        const double button = 108 * s.text / 16;
        s.canvas().box({x, y + s.areas.row / 2 - 9, 18, 18}, s.colours.earth[std::min(i, 7)], 4);
        s.line({x + 26, y, width - 34 - button, s.areas.row},
               "Layer " + std::to_string(i + 1) +
                   (i + 1 == count ? ", without end"
                    : i == 0       ? ", on top"
                                   : ""),
               {s.text, s.colours.ink, Across::left, true});
        if (count > 1 && s.button("layer." + std::to_string(i) + ".remove", "Remove",
                                  {x + width - button, y + 4, button, s.areas.row - 8}, Look::bare,
                                  "Remove layer " + std::to_string(i + 1))) {
            session.history.settle(session.plan);
            session.act(session.remove_layer(i));
            return y + s.areas.row;  // the rest is drawn anew in the next frame
        }
        y += s.areas.row;
        for (const Choice& choice : choices)
            if (choice.key == prefix + "material") y = choice_row(s, choice, x, y, width);
        for (const Field& field : fields)
            if (field.key.rfind(prefix, 0) == 0) y = number_row(s, field.key, x, y, width);
        if (s.button("layer." + std::to_string(i) + ".add", "Add a layer above this",
                     {x, y + 4, width, s.areas.row - 8}, Look::bare,
                     "Add a layer above layer " + std::to_string(i + 1))) {
            session.history.settle(session.plan);
            session.act(session.add_layer(i));
            return y + s.areas.row;
        }
        y += s.areas.row + 6;
        if (i + 1 < count) s.hairline(x, y - 4, width);
    }
    return y;
}

double all_inputs_ui(Screen& s, const std::string& only, double x, double y, double width) {
    struct Part {
        const char *group, *name;
    };
    constexpr Part parts[] = {{"target", "Target"},
                              {"ground", "Ground"},
                              {"antenna", "Antenna"},
                              {"pass", "Pass: what is keyed in"},
                              {"lanes", "Lanes: what is walked"},
                              {"need", "Need: what the client asks for; 0 is nothing"}};
    for (const Part& part : parts) {
        if (!only.empty() && only != part.group) continue;
        if (only.empty()) {
            y += 10;
            s.line({x, y, width, 30}, part.name, {s.small, s.colours.wave, Across::left, true});
            y += 32;
        }
        if (std::string_view(part.group) == "ground") {
            y = ground_ui(s, x, y, width);
        } else {
            for (const Choice& choice : choices_of(s.session.plan))
                if (group_of(choice.key) == part.group) y = choice_row(s, choice, x, y, width);
            for (const Field& field : fields_of(s.session.plan))
                if (group_of(field.key) == part.group) y = number_row(s, field.key, x, y, width);
        }
        if (only.empty()) s.hairline(x, y + 8, width), y += 10;
    }
    return y;
}

/// "Asphalt, Gravel, Wet clay"
static std::string ground_words(const Plan& plan) {
    std::string out;
    for (const Layer& layer : plan.ground) {
        const CatalogueRow* row = find_material(layer.matter.material);
        out += (out.empty() ? "" : ", ") + (row ? row->name : std::string("own numbers"));
    }
    return out;
}

void view_inputs_ui(Screen& s) {
    const Box area = s.areas.inputs;
    if (!(area.width > 60 && area.height > 8)) return;
    s.canvas().box(area, s.colours.paper, 0);
    Session& session = s.session;
    const ViewRow& view = views()[static_cast<std::size_t>(session.view.view)];
    const double x = area.x + s.areas.margin, width = area.width - 2 * s.areas.margin;
    double y = s.begin_scroll("inputs", area) + 2;
    std::size_t n = 0;
    for (const std::string& key : view.fields) {
        if (n++ == 3) {
            for (const Choice& choice : choices_of(session.plan))
                if (choice.key == "target.filling" && view.view != View::lanes) y = choice_row(s, choice, x, y, width);
            if (view.view != View::lanes &&
                lead_row(s, "inputs.ground", "Ground", ground_words(session.plan), {x, y, width, s.areas.row}))
                session.show(Sheet::Kind::inputs, "ground");
            if (view.view != View::lanes) y += s.areas.row;
        }
        y = number_row(s, key, x, y, width);
    }
    if (lead_row(s, "inputs.all", "All inputs", {}, {x, y, width, s.areas.row})) session.show(Sheet::Kind::inputs);
    s.end_scroll(y + s.areas.row + 8);
}

void input_column_ui(Screen& s) {
    const Box area = s.areas.inputs;
    if (!(area.width > 60 && area.height > 8)) return;
    s.canvas().box(area, s.colours.paper, 0);
    s.canvas().box({area.right() - 1, area.y, 1, area.height}, s.colours.hairline, 0);
    const double y = s.begin_scroll("inputs", {area.x, area.y, area.width - 1, area.height});
    s.end_scroll(all_inputs_ui(s, {}, area.x + s.areas.margin, y, area.width - 2 * s.areas.margin - 4) + 12);
}

}  // namespace gg

#include "ui/session.hpp"

#include <algorithm>
#include <cmath>
#include <cstdio>

#include "paper/plan_file.hpp"

namespace gg {

Session::Session() {
    if (!demos().empty()) {
        ReadPlan first = read_plan(demos().front().json);
        if (first.ok()) plan = std::move(first.plan);
    }
    if (plan.ground.empty()) plan.ground.push_back({matter_of("own"), exactly(1.0)});
    history = History(plan);
    refresh();
}

void Session::refresh() {
    if (answered_ && *answered_ == plan) return;
    answered_ = plan;
    const std::vector<std::string> faults = faults_of(plan);
    stale.clear();
    if (faults.empty() || answers.list.empty()) answers = answers_for(plan);
    if (!faults.empty()) stale = faults.front();
}

std::string Session::set(std::string_view key, double value) { return set_number(plan, key, value); }

std::string Session::choose(std::string_view key, std::string_view option) {
    std::string fault = set_choice(plan, key, option);
    if (fault.empty()) {
        // "ground.2.material" and "ground.0.material" are one kind of list.
        const std::size_t dot = key.rfind('.');
        preferences.used(std::string(dot == std::string_view::npos ? key : key.substr(dot + 1)), std::string(option));
    }
    return fault;
}

std::string Session::add_layer(int above) { return gg::add_layer(plan, above); }
std::string Session::remove_layer(int index) { return gg::remove_layer(plan, index); }

void Session::act(const std::string& fault) {
    if (!fault.empty()) say_notice(words(fault));
    history.settle(plan);
}

void Session::open(Plan next, std::string text) {
    history.settle(plan);
    plan = std::move(next);
    history.settle(plan);
    view.sheets.clear();
    view.edit = {};
    say_notice(std::move(text));
}

std::string Session::open_text(std::string_view json, std::string_view name) {
    ReadPlan read = read_plan(json);
    if (!read.ok()) return std::string(name) + ": " + read.faults.front();
    std::string text = "Opened: " + read.plan.name;
    if (!read.notes.empty()) text.append(". ").append(read.notes.front());
    open(std::move(read.plan), std::move(text));
    return {};
}

void Session::undo() {
    if (!history.can_undo(plan)) return say_notice("Nothing to undo");
    plan = history.undo(plan);
    view.edit = {};
}

void Session::redo() {
    if (!history.can_redo()) return say_notice("Nothing to redo");
    plan = history.redo(plan);
    view.edit = {};
}

void Session::say_notice(std::string text) {
    notice = std::move(text);
    notice_until = now + 5.0;
    requests.push_back({Request::Kind::announce, "notice", notice});
}

void Session::show(Sheet::Kind kind, std::string key) {
    const Sheet sheet{kind, std::move(key)};
    if (!view.sheets.empty() && view.sheets.back() == sheet) return;
    view.sheets.push_back(sheet);
    view.formula_open = false;
    view.focus.clear();
}

void Session::close() {
    if (view.sheets.empty()) return;
    const Sheet::Kind kind = view.sheets.back().kind;
    view.sheets.pop_back();
    if (kind == Sheet::Kind::keypad || kind == Sheet::Kind::rename) view.edit = {};
    view.focus.clear();
}

void Session::begin_edit(std::string_view key) {
    const auto field = find_field(plan, key);
    const auto value = number_at(plan, key);
    if (!field || !value) return;
    view.edit = {std::string(key), shown_number(*value, field->quantity, units(), true), {}, true, false};
}

bool Session::commit_edit() {
    Edit& edit = view.edit;
    const auto field = find_field(plan, edit.key);
    if (!field) return edit = {}, true;
    if (edit.fresh) return true;  // untouched
    const auto value = read_number(edit.text, field->quantity, units());
    edit.fault = value ? words(set(edit.key, *value)) : edit.text + " is no number.";
    if (!edit.fault.empty()) {
        requests.push_back({Request::Kind::announce, "fault", edit.fault});
        return false;
    }
    history.settle(plan);
    edit.fresh = true;
    return true;
}

std::string shown_number(double si, Quantity quantity, UnitSystem units, bool bare) {
    const TypedUnit unit = typed_unit(quantity, units);
    const double typed = (si - unit.offset) / unit.factor;
    // Three digits that count at least, more where the unit's usual places give more; no zeros after them.
    int places = std::max(0, unit.decimals);
    if (const double size = std::abs(typed); size > 0 && size < 100)
        places = std::clamp(2 - static_cast<int>(std::floor(std::log10(size))), places, 9);
    char text[64];
    std::snprintf(text, sizeof text, "%.*f", places, std::isfinite(typed) ? typed : 0.0);
    std::string out = text;
    if (const std::size_t dot = out.find('.'); dot != std::string::npos) {
        const std::size_t fixed = dot + 1 + static_cast<std::size_t>(std::max(0, unit.decimals));
        while (out.size() > fixed && out.back() == '0') out.pop_back();
        if (out.back() == '.') out.pop_back();
    }
    if (out == "-0") out = "0";
    return bare || unit.name.empty() ? out : out + " " + unit.name;
}

}  // namespace gg

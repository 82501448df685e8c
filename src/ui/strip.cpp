// The answers: a strip of tiles on phone and tablet, a column on the desktop.
#include <algorithm>
#include <cmath>

#include "paper/plan_file.hpp"
#include "ui/parts.hpp"

namespace gg {

std::string likely_words(const Answer& answer, UnitSystem units) {
    return answer.likely.ok() ? say(answer.likely.value, answer.quantity, units) : "\u2013";
}

/// Answers that matter to the view first, then the others in their own order.
static std::vector<const Answer*> in_order(const Session& session) {
    const ViewRow& view = views()[static_cast<std::size_t>(session.view.view)];
    std::vector<const Answer*> out;
    for (const std::string& key : view.answers)
        if (const Answer* answer = session.answers.find(key)) out.push_back(answer);
    for (const Answer& answer : session.answers.list)
        if (std::find(out.begin(), out.end(), &answer) == out.end()) out.push_back(&answer);
    return out;
}

static void tile(Screen& s, const Answer& answer, Box box, bool wide) {
    const std::string value = likely_words(answer, s.session.units());
    const std::string grade(word_for(answer.grade));
    const Hit hit =
        s.control("answer." + answer.key, "button", answer.name, grade.empty() ? value : value + ", " + grade, box);
    s.backdrop(box, hit, hit.held || hit.hovered ? Look::quiet : Look::bare, 8);
    if (hit.pressed) s.session.show(Sheet::Kind::card, answer.key);
    const bool old = !s.session.stale.empty();
    const double pad = wide ? s.areas.margin : 10, sign = std::round(s.small * 0.46);
    const Box inner{box.x + pad, box.y, box.width - 2 * pad, box.height};
    double x = inner.x;
    const double middle = wide ? inner.y + inner.height * 0.5 : inner.y + inner.height * 0.7;
    const double line = std::round(s.text * 1.3);
    if (wide) {
        // Sign, name | value over grade.
        if (answer.grade != Grade::none)
            grade_sign(s.canvas(), {x + sign, middle}, sign, answer.grade, old ? s.colours.soft_ink : s.colours.ink);
        const double left = x + 2 * sign + 10, split = std::min(0.42 * inner.width, 130.0 * s.text / 15);
        s.label({left, box.y, inner.right() - split - left - 6, box.height}, answer.name, {s.text});
        const Box right{inner.right() - split, 0, split, line};
        const double top = grade.empty() ? middle - line / 2 : middle - line + 1;
        s.line({right.x, top, right.width, line}, value,
               {s.text, old ? s.colours.soft_ink : s.colours.ink, Across::right, true});
        if (!grade.empty())
            s.line({right.x, top + line - 2, right.width, line}, grade, {s.small, s.colours.soft_ink, Across::right});
        return;
    }
    s.line({inner.x, box.y + inner.height * 0.32 - line / 2, inner.width, line}, answer.name,
           {s.text, s.colours.soft_ink});
    if (answer.grade != Grade::none) {
        grade_sign(s.canvas(), {x + sign, middle}, sign, answer.grade, old ? s.colours.soft_ink : s.colours.ink);
        x += 2 * sign + 7;
    }
    const double room = inner.right() - x;
    const double wide_value = s.width_of(value, s.text) + 1;
    s.line({x, middle - line / 2, std::min(room, wide_value + 2), line}, value,
           {s.text, old ? s.colours.soft_ink : s.colours.ink, Across::left, true});
    if (!grade.empty() && room - wide_value > s.width_of(grade, s.text) + 8)
        s.line({x + wide_value + 8, middle - line / 2, room - wide_value - 8, line}, grade,
               {s.text, s.colours.soft_ink});
}

void strip_ui(Screen& s) {
    const Box area = s.areas.strip;
    if (!(area.width > 20 && area.height > 20)) return;
    s.canvas().box(area, s.colours.paper, 0);
    const bool tablet = s.areas.kind == Areas::Kind::tablet;
    const int across = tablet ? 4 : 2, down = tablet ? 1 : 2, per_page = across * down;
    const std::vector<const Answer*> list = in_order(s.session);
    const double dots = tablet ? 0 : 4;
    const Box inner{area.x, area.y, area.width, area.height - dots};
    const double x = s.begin_scroll("strip", inner, true, inner.width);
    const double width = inner.width / across, height = inner.height / down;
    const int pages = (static_cast<int>(list.size()) + per_page - 1) / per_page;
    for (int i = 0; i < static_cast<int>(list.size()); ++i) {
        const int page = i / per_page, on_page = i % per_page;
        const Box box{x + page * inner.width + (on_page % across) * width, inner.y + (on_page / across) * height, width,
                      height};
        if (box.right() < inner.x - 1 || box.x > inner.right() + 1) continue;
        tile(s, *list[static_cast<std::size_t>(i)], box, false);
        if (on_page % across) s.canvas().box({box.x, box.y + 10, 1, height - 20}, s.colours.hairline, 0);
    }
    // The last page says what no number can.
    const Box last{x + pages * inner.width, inner.y, inner.width, inner.height};
    const Hit hit = s.control("caution", "button", "Caution", {}, last);
    if (hit.pressed) s.session.show(Sheet::Kind::about);
    s.label({last.x + 12, last.y, last.width - 24, last.height},
            "A survey cannot prove that nothing is there. Tap for the cautions.", {s.text, s.colours.soft_ink});
    s.end_scroll(last.right());
    s.hairline(area.x, area.bottom() - 1, area.width);
    // Where in the row of pages we are.
    const double at = std::clamp((inner.x - x) / std::max(1.0, inner.width), 0.0, static_cast<double>(pages));
    const double share = area.width / (pages + 1);
    s.canvas().box({area.x + at * share, area.bottom() - 3, share, 3}, s.colours.wave, 1.5);
}

static const char* name_of(Group group) {
    switch (group) {
        case Group::wave:
            return "The wave in the ground";
        case Group::patch:
            return "Lit patch";
        case Group::pulse:
            return "Pulse at the target";
        case Group::downwards:
            return "Told apart downwards";
        case Group::sideways:
            return "Told apart sideways";
        case Group::smallest:
            return "Smallest size";
        case Group::pass:
            return "To key in";
        case Group::lanes:
            return "To walk";
    }
    return "";
}

void answer_column_ui(Screen& s) {
    const Box area = s.areas.answers;
    if (!(area.width > 20 && area.height > 20)) return;
    s.canvas().box(area, s.colours.paper, 0);
    s.canvas().box({area.x, area.y, 1, area.height}, s.colours.hairline, 0);
    const std::size_t first = views()[static_cast<std::size_t>(s.session.view.view)].answers.size();
    const std::vector<const Answer*> list = in_order(s.session);
    double y = s.begin_scroll("answers", area) + 8;
    const auto heading = [&](std::string_view words) {
        y += 10;
        s.line({area.x + s.areas.margin, y, area.width - 2 * s.areas.margin, 26}, words,
               {s.small, s.colours.wave, Across::left, true});
        y += 28;
    };
    const double height = std::round(s.text * 3.1);
    for (std::size_t i = 0; i < list.size(); ++i) {
        const bool for_view = i < first;
        if (i == 0)
            heading(std::string(views()[static_cast<std::size_t>(s.session.view.view)].name) + ": what it answers");
        else if (!for_view && (i == first || list[i]->group != list[i - 1]->group))
            heading(name_of(list[i]->group));
        tile(s, *list[i], {area.x + 1, y, area.width - 2, height}, true);
        y += height;
    }
    s.end_scroll(y + 12);
}

void footer_ui(Screen& s) {
    const Box area = s.areas.footer;
    if (!(area.width > 20 && area.height > 4)) return;
    s.canvas().box(area, s.colours.panel, 0);
    const Hit hit = s.control("caution", "button", "Caution", std::string(caution()), area);
    if (hit.pressed) s.session.show(Sheet::Kind::about);
    s.line({area.x + s.areas.margin, area.y, area.width - 2 * s.areas.margin, area.height}, caution(),
           {s.small, s.colours.soft_ink});
}

}  // namespace gg

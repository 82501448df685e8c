// The card that explains one answer.
#include <algorithm>
#include <cmath>

#include "ui/parts.hpp"

namespace gg {

/// Computed beside rule: bars on one scale, each with its name, number and source.
static double bars(Screen& s, const Answer& answer, double x, double y, double width) {
    double most = std::max(answer.likely.value, answer.high);
    for (const Rule& rule : answer.rules) most = std::max(most, rule.value);
    if (!(most > 0)) return y;
    const double line = std::round(s.text * 1.4), bar = 8;
    const auto row = [&](std::string_view name, double value, bool own, std::string_view source) {
        const double number = s.width_of(say(value, answer.quantity, s.session.units()), s.text) + 6;
        s.line({x + width - number, y, number, line}, say(value, answer.quantity, s.session.units()),
               {s.text, s.colours.ink, Across::right, own});
        y = s.paragraph(x, y, width - number - 8, name, {s.text, s.colours.ink, Across::left, own}) + 2;
        s.canvas().box({x, y, width, bar}, s.colours.panel, 4);
        s.canvas().box({x, y, std::max(3.0, width * std::clamp(value / most, 0.0, 1.0)), bar},
                       own ? s.colours.wave : s.colours.soft_ink, 4);
        if (own && answer.high > answer.low) {  // the span of the ranges, as a line with ends over the bar
            const double a = x + width * std::clamp(answer.low / most, 0.0, 1.0),
                         b = x + width * std::clamp(answer.high / most, 0.0, 1.0);
            const Point span[] = {{a, y + bar / 2}, {b, y + bar / 2}};
            s.canvas().line(span, {s.colours.ink, 2}, false);
            s.canvas().box({a - 1, y - 3, 2, bar + 6}, s.colours.ink, 0);
            s.canvas().box({b - 1, y - 3, 2, bar + 6}, s.colours.ink, 0);
        }
        y += bar + 5;
        if (!source.empty()) y = s.paragraph(x, y, width, source, {s.small, s.colours.soft_ink});
        y += 8;
    };
    row("Computed for this plan", answer.likely.value, true, {});
    for (const Rule& rule : answer.rules) row("Rule: " + s.session.words(rule.name), rule.value, false, rule.source);
    return y;
}

void card_ui(Screen& s, const std::string& key) {
    const Answer* found = s.session.answers.find(key);
    if (!found) return s.session.close();
    const Answer answer = *found;  // a mend below changes the list
    const UnitSystem units = s.session.units();
    const Box box = sheet_frame(s, answer.name, 560);
    const double x = box.x, width = box.width;
    double y = s.begin_scroll("card", {box.x - 8, box.y, box.width + 16, box.height}) + 12;

    if (!s.session.stale.empty())
        y = s.paragraph(x, y, width, "From the last plan that made sense. " + s.session.words(s.session.stale),
                        {s.small, s.colours.warn}) +
            8;
    const double big = s.large * 1.5, line = std::round(big * 1.35);
    s.line({x, y, width, line}, likely_words(answer, units), {big, s.colours.ink, Across::left, true});
    if (answer.grade != Grade::none) {
        const std::string word(word_for(answer.grade));
        const double r = s.text * 0.55, w = s.width_of(word, s.text);
        grade_sign(s.canvas(), {x + width - w - r - 8, y + line / 2}, r, answer.grade, s.colours.ink);
        s.line({x + width - w - 2, y, w + 2, line}, word, {s.text, s.colours.ink, Across::right, true});
    }
    y += line;
    if (answer.likely.ok() && answer.high > answer.low)
        y = s.paragraph(x, y, width,
                        "Between " + say(answer.low, answer.quantity, units) + " and " +
                            say(answer.high, answer.quantity, units) + " over the ranges you gave",
                        {s.text, s.colours.soft_ink});
    if (answer.likely.issue != Issue::none)
        y = s.paragraph(x, y + 4, width, sentence(answer.likely.issue), {s.text, s.colours.warn});
    y = s.paragraph(x, y + 10, width, s.session.words(answer.why)) + 14;

    int n = 0;
    for (const Mend& mend : answer.mends) {
        const Box button{x, y, width, s.areas.row};
        if (s.button("mend." + std::to_string(n++), s.session.words(mend.words), button, Look::strong)) {
            s.session.history.settle(s.session.plan);
            const std::string fault = s.session.set(mend.field, mend.value);
            s.session.act(fault);
            if (fault.empty()) s.session.say_notice(s.session.words(mend.words) + ": done. Undo takes it back.");
        }
        y += s.areas.row + 8;
    }
    if (answer.likely.ok()) {
        y += 6;
        y = bars(s, answer, x, y, width);
    }
    if (!answer.formula.empty()) {
        const bool open = s.session.view.formula_open;
        const Box fold{x, y, width, s.areas.row};
        const Hit hit =
            s.control("formula", "button", open ? "Hide how it is computed" : "How it is computed", {}, fold);
        s.backdrop({fold.x - 8, fold.y, fold.width + 16, fold.height}, hit, Look::bare);
        s.hairline(x, y, width);
        s.line({x, y, width - 30, s.areas.row}, "How it is computed", {s.text, s.colours.wave});
        s.sign(open ? Screen::Sign::minus : Screen::Sign::plus, {x + width - 10, y + s.areas.row / 2}, 14,
               s.colours.wave);
        if (hit.pressed) s.session.view.formula_open = !open;
        y += s.areas.row;
        if (open) {
            y = s.paragraph(x, y + 4, width, s.session.words(answer.formula));
            if (answer.likely.ok())
                y = s.paragraph(x, y + 6, width,
                                "To all its digits: " + say_exactly(answer.likely.value, answer.quantity, units) +
                                    " (" + say_exactly(answer.low, answer.quantity, units) + " to " +
                                    say_exactly(answer.high, answer.quantity, units) + ")",
                                {s.text, s.colours.soft_ink});
        }
    }
    s.end_scroll(y + 16);
}

}  // namespace gg

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>

#include "pictures.hpp"

using namespace gg;

namespace {

const Handle* handle_of(const Figure& figure, std::string_view field) {
    const auto found =
        std::find_if(figure.handles.begin(), figure.handles.end(), [&](const Handle& h) { return h.field == field; });
    return found == figure.handles.end() ? nullptr : &*found;
}

void check_sound(const ViewRow& view, const Drawn& drawn, const FigureStyle& style) {
    CHECK_MESSAGE(xml_fault(drawn.svg).empty(), view.id, ": ", xml_fault(drawn.svg));
    CHECK(drawn.svg.find("nan") == std::string::npos);
    CHECK(drawn.svg.find("inf\"") == std::string::npos);
    CHECK(!drawn.figure.description.empty());
    CHECK(drawn.svg.size() < 2000000);
    for (const Handle& h : drawn.figure.handles) {
        CHECK_MESSAGE(style.box.holds(h.at), view.id, " ", h.field);
        CHECK(std::isfinite(h.start));
        CHECK(std::isfinite(h.per_px));
        CHECK(!h.name.empty());
    }
}

}  // namespace

TEST_CASE("every picture of every plan is sound at every size, in both themes and unit systems") {
    std::vector<Plan> plans = extreme_plans();
    for (auto* plan : {+[] { return Plan{}; }, pipe_plan, bars_plan, footing_plan}) plans.push_back(plan());
    for (const Plan& plan : plans) {
        const Answers answers = answers_for(plan);
        for (const Box& size : {Box{0, 0, 344, 300}, Box{0, 0, 820, 760}, Box{0, 0, 90, 60}, Box{0, 0, 30, 500},
                                Box{0, 0, 0, 0}, Box{0, 0, -5, 3}}) {
            for (const bool dark : {false, true}) {
                FigureStyle style = style_of(size.width, size.height);
                style.dark = dark;
                style.units = dark ? UnitSystem::imperial : UnitSystem::metric;
                for (const ViewRow& view : views()) check_sound(view, draw(view, plan, answers, style), style);
            }
        }
    }
}

TEST_CASE("a plan that makes sense gives every picture handles, and each handle names a field of the plan") {
    for (const Plan& plan : {pipe_plan(), bars_plan(), footing_plan()}) {
        const Answers answers = answers_for(plan);
        for (const ViewRow& view : views()) {
            const Figure figure = draw(view, plan, answers, style_of(820, 760)).figure;
            CHECK(figure.handles.size() >= 2);
            for (const Handle& h : figure.handles) {
                REQUIRE_MESSAGE(number_at(plan, h.field).has_value(), h.field);
                CHECK(*number_at(plan, h.field) == doctest::Approx(h.start));
            }
            for (const std::string& key : view.fields) CHECK_MESSAGE(find_field(plan, key).has_value(), key);
            for (const std::string& key : view.answers) CHECK_MESSAGE(answers.find(key) != nullptr, key);
        }
    }
}

TEST_CASE("a pixel is as many metres down as across in the Beam picture") {
    for (const Plan& plan : {pipe_plan(), bars_plan()}) {
        const Figure figure = draw(views()[0], plan, answers_for(plan), style_of(820, 760)).figure;
        const Handle *down = handle_of(figure, "target.depth"), *across = handle_of(figure, "target.gap"),
                     *boundary = handle_of(figure, "ground.0.thickness");
        REQUIRE((down && across && boundary));
        CHECK(down->per_px == doctest::Approx(across->per_px));
        // Measured between two places that are drawn, not read from the handle: target's top and the boundary.
        const double px = down->at.y - boundary->at.y,
                     metres = plan.target.depth.likely - plan.ground[0].thickness.likely;
        CHECK(px * down->per_px == doctest::Approx(metres).epsilon(1e-6));
        // And across: from the target under the antenna, where the size grip hangs, to its neighbour.
        const Handle* size = handle_of(figure, "target.size");
        REQUIRE(size);
        CHECK((across->at.x - size->at.x) * down->per_px == doctest::Approx(plan.target.gap).epsilon(1e-6));
    }
}

TEST_CASE("a handle that is dragged stands under the finger afterwards") {
    const double reach = 4.0;
    for (const Plan& plan : {pipe_plan(), bars_plan()}) {
        for (const ViewRow& view : views()) {
            const Figure before = draw(view, plan, answers_for(plan), style_of(820, 760)).figure;
            for (const Handle& h : before.handles) {
                const bool across = h.way == Handle::Way::across, round = h.way == Handle::Way::round;
                Point to{h.at.x + (across ? reach : 0), h.at.y + (across ? 0 : reach)};
                if (round) {  // a few degrees on around the pivot
                    const double dx = h.at.x - h.pivot.x, dy = h.at.y - h.pivot.y, a = 0.05;
                    to = {h.pivot.x + dx * std::cos(a) - dy * std::sin(a),
                          h.pivot.y + dx * std::sin(a) + dy * std::cos(a)};
                }
                Handle fine = h;
                fine.snap = 0.0;
                Plan after = plan;
                REQUIRE(set_number(after, h.field, dragged(fine, h.at, to)) == "");
                const Figure figure = draw(view, after, answers_for(after), style_of(820, 760)).figure;
                const Handle* moved = handle_of(figure, h.field);
                REQUIRE_MESSAGE(moved, view.id, " ", h.field);
                // Within 1.5 px of 4: a lossy ground's wavelength is not quite 1/f, a pulse's arrival not quite 2 depth
                // / speed.
                if (round) {
                    CHECK(std::atan2(moved->at.x - moved->pivot.x, moved->pivot.y - moved->at.y) ==
                          doctest::Approx(std::atan2(to.x - h.pivot.x, h.pivot.y - to.y)).epsilon(1e-3));
                } else {
                    const double went = across ? moved->at.x - h.at.x : moved->at.y - h.at.y;
                    // The lines stand evenly in the site, so that the first, where the ruler starts, shifts by up to
                    // half a spacing at either time.
                    const double spare = h.field == "lanes.spacing" ? plan.lanes.spacing * 760 / 15 : 0.0;
                    CHECK_MESSAGE(std::abs(went - reach) < 1.5 + spare, view.id, " ", h.field, " went ", went);
                }
            }
        }
    }
}

TEST_CASE("dragging adds, turns, inverts and snaps") {
    Handle h;
    h.start = 2.0;
    h.per_px = 0.1;
    CHECK(dragged(h, {0, 0}, {50, 10}) == doctest::Approx(3.0));
    h.way = Handle::Way::across;
    CHECK(dragged(h, {0, 0}, {-10, 50}) == doctest::Approx(1.0));
    h.snap = 0.25;
    CHECK(dragged(h, {0, 0}, {1, 0}) == doctest::Approx(2.0));
    h.snap = 0.0;
    h.inverse = true;
    CHECK(dragged(h, {0, 0}, {-20, 0}) == doctest::Approx(1.0));    // 1/value doubled
    CHECK(dragged(h, {0, 0}, {1000, 0}) == doctest::Approx(40.0));  // past nothing: held
    Handle turn;
    turn.way = Handle::Way::round;
    CHECK(dragged(turn, {}, {0, -5}) == doctest::Approx(0.0));
    CHECK(dragged(turn, {}, {5, 0}) == doctest::Approx(1.5707963268));
    CHECK(dragged(turn, {}, {-5, 0}) == doctest::Approx(4.7123889804));
    turn.turn = 3.14159265358979;
    CHECK(dragged(turn, {}, {-5, 0}) == doctest::Approx(1.5707963268));
}

TEST_CASE("the words of a picture hold the numbers of the answers") {
    const Plan plan = pipe_plan();
    const Answers answers = answers_for(plan);
    const auto shows = [&](int view, double value, Quantity quantity) {
        for (const UnitSystem units : {UnitSystem::metric, UnitSystem::imperial}) {
            FigureStyle style = style_of(820, 760);
            style.units = units;
            const Drawn drawn = draw(views()[static_cast<std::size_t>(view)], plan, answers, style);
            const std::string words = say(value, quantity, units);
            CHECK_MESSAGE(drawn.figure.description.find(words) != std::string::npos, words);
            CHECK_MESSAGE(drawn.svg.find(words) != std::string::npos, words);
        }
    };
    shows(0, 2 * answers.beam.patch_along, Quantity::length);
    shows(0, answers.beam.wavelength_at_target, Quantity::length);
    shows(0, plan.target.depth.likely, Quantity::length);
    shows(1, plan.pass.window, Quantity::time);
    shows(1, answers.find("target.time")->likely.value, Quantity::time);
    shows(2, plan.target.gap, Quantity::length);
    shows(2, answers.find("apart.sideways")->likely.value, Quantity::length);
    shows(3, plan.lanes.spacing, Quantity::length);
    const std::string site = draw(views()[3], plan, answers, style_of(820, 760)).figure.description;
    CHECK(site.find(std::to_string(answers.lanes.hits.size()) + " hits") != std::string::npos);
}

TEST_CASE("a phone with text half as large again still says what its grips drag, in both unit systems") {
    for (const Plan& plan : {pipe_plan(), bars_plan(), footing_plan()}) {
        const Answers answers = answers_for(plan);
        for (const UnitSystem units : {UnitSystem::metric, UnitSystem::imperial}) {
            for (const double text : {14.0, 17.5, 21.0}) {
                FigureStyle style = style_of(367, 330);
                style.units = units;
                style.text = text;
                const auto said = [&](std::size_t view) {
                    return words_in(draw(views()[view], plan, answers, style).svg);
                };
                const auto length = [&](double metres) { return say(metres, Quantity::length, units); };
                const auto check = [&](const std::string& all, const std::string& words) {
                    CHECK_MESSAGE(all.find(words) != std::string::npos, plan.antenna.pulse.centre_frequency, " Hz, ",
                                  text, " px: ", words);
                };
                check(said(0), length(plan.target.depth.likely));
                check(said(0), "wavelength " + length(answers.beam.wavelength_at_target));
                for (const char* key : {"came back", "rebuilt", "joined dots", "error"}) check(said(1), key);
                check(said(1), say(plan.pass.window, Quantity::time, units));
                check(said(2), length(plan.target.depth.likely) + " deep");
                check(said(2), length(plan.target.gap));
                check(said(3), std::to_string(answers.lanes.lines.size()) + " lines, ");
                check(said(3), length(plan.lanes.spacing));
            }
        }
    }
}

TEST_CASE("in print no grips are drawn, and a held one is drawn stronger") {
    const Plan plan = pipe_plan();
    const Answers answers = answers_for(plan);
    for (const ViewRow& view : views()) {
        FigureStyle style = style_of(344, 300);
        const Drawn plain = draw(view, plan, answers, style);
        style.handles = false;
        const Drawn print = draw(view, plan, answers, style);
        CHECK(print.svg.size() < plain.svg.size());
        style.handles = true;
        style.held = plain.figure.handles.front().field;
        CHECK(draw(view, plan, answers, style).svg.size() > plain.svg.size());
    }
}

// The whole interactive program without a window: fed with input, read by its controls.
#include "ui/program.hpp"

#include <doctest/doctest.h>
#include <imgui.h>

#include <cmath>
#include <limits>
#include <nlohmann/json.hpp>

#include "draw/units.hpp"
#include "paper/pair_desk.hpp"
#include "paper/plan_file.hpp"
#include "ui/history.hpp"
#include "ui/imgui_canvas.hpp"
#include "ui/preferences.hpp"
#include "wave/embedded.hpp"

using namespace gg;

namespace {

struct Bench {
    Program program{embedded::font_ttf()};
    Surface surface;
    double now = 1.0;
    std::vector<Request> requests;  ///< all but the orders, which are answered after their frame
    PairDesk desk;
    bool answers = true;  ///< false: the orders wait in `orders`
    std::vector<std::string> orders;

    explicit Bench(double width = 360, double height = 640, bool touch = true) {
        surface.width = width;
        surface.height = height;
        surface.touch = touch;
        program.set_surface(surface);
        frames(3);
    }
    void frame(double seconds = 0.016) {
        program.frame(now += seconds);
        for (Request& r : program.take_requests()) {
            if (r.kind != Request::Kind::reckon)
                requests.push_back(std::move(r));
            else if (answers)
                program.reckoned(desk.answer(r.text));
            else
                orders.push_back(std::move(r.text));
        }
    }
    void frames(int n) {
        for (int i = 0; i < n; ++i) frame();
    }
    nlohmann::json control(const std::string& id) {
        for (const auto& c : nlohmann::json::parse(program.controls_json(), nullptr, false))
            if (c["id"] == id) return c;
        return {};
    }
    std::string value(const std::string& id) {
        const auto c = control(id);
        return c.is_object() ? c["value"].get<std::string>() : "(not there)";
    }
    Point centre(const std::string& id) {
        const auto c = control(id);
        REQUIRE_MESSAGE(c.is_object(), "no control " << id);
        return {c["x"].get<double>() + c["width"].get<double>() / 2,
                c["y"].get<double>() + c["height"].get<double>() / 2};
    }
    void tap(Point p) {
        program.pointer_button(p.x, p.y, true, true);
        frames(2);
        program.pointer_button(p.x, p.y, false, true);
        frames(6);
    }
    void click(Point p) {
        program.pointer_move(p.x, p.y, false);
        frames(2);
        program.pointer_button(p.x, p.y, true, false);
        frames(2);
        program.pointer_button(p.x, p.y, false, false);
        frames(4);
    }
    void press(const std::string& id) {
        program.press(id);
        frames(3);
    }
    void strike(int key) {
        program.key(key, true);
        frames(2);
        program.key(key, false);
        frames(2);
    }
    void wait(double seconds) {
        for (double t = 0; t < seconds; t += 0.1) frame(0.1);
    }
};

}  // namespace

TEST_CASE("every view draws at every size, theme and unit, with ordinary and extreme plans") {
    for (const Demo& demo : demos()) {
        for (const Point size : {Point{360, 640}, {640, 360}, {820, 1180}, {1440, 900}, {80, 60}, {0, 0}}) {
            Bench b(size.x, size.y);
            b.program.opened(demo.name, demo.json);
            for (const bool dark : {false, true}) {
                b.surface.system_dark = dark;
                b.program.set_surface(b.surface);
                for (const char* view : {"view.beam", "view.pulse", "view.pair", "view.lanes"}) {
                    b.press(view);
                    const ImDrawData* drawn = ImGui::GetDrawData();
                    REQUIRE(drawn != nullptr);
                    for (int i = 0; i < drawn->CmdListsCount; ++i)
                        for (const ImDrawVert& v : drawn->CmdLists[i]->VtxBuffer)
                            REQUIRE((std::isfinite(v.pos.x) && std::isfinite(v.pos.y)));
                }
            }
        }
    }
}

TEST_CASE("every sheet opens, is drawn and closes again") {
    for (const Point size : {Point{360, 640}, {640, 360}, {1440, 900}, {80, 60}}) {
        Bench b(size.x, size.y);
        for (const char* way : {"menu", "menu.about", "close", "menu.demos", "close", "menu.rename", "close",
                                "menu.inputs", "close", "close"})
            b.press(way);
        CHECK(b.control("close").is_null());
    }
}

TEST_CASE("controls stand inside the screen of a phone, none narrower than a thumb can hit") {
    Bench b;
    for (const char* way : {"view.beam", "view.lanes", "menu", "menu.inputs"}) {
        b.press(way);
        for (const auto& c : nlohmann::json::parse(b.program.controls_json())) {
            INFO(c.dump());
            CHECK(c["x"].get<double>() >= 0);
            CHECK(c["y"].get<double>() >= 0);
            CHECK(c["x"].get<double>() + c["width"].get<double>() <= 360.5);
            CHECK(c["y"].get<double>() + c["height"].get<double>() <= 640.5);
        }
    }
}

TEST_CASE("a tap is one click, by finger and by mouse") {
    Bench b;
    const double before = b.program.plan().target.size;
    b.tap(b.centre("field.target.size.more"));
    const double once = b.program.plan().target.size;
    CHECK(once > before);
    b.tap(b.centre("field.target.size.less"));
    CHECK(b.program.plan().target.size == doctest::Approx(before));
    b.click(b.centre("field.target.size.more"));
    CHECK(b.program.plan().target.size == doctest::Approx(once));
}

TEST_CASE("a finger that moves scrolls and clicks nothing; one that is joined by a second clicks nothing") {
    Bench b;
    const Plan before = b.program.plan();
    const Point p = b.centre("field.target.size.more");
    b.program.pointer_button(p.x, p.y, true, true);
    b.frames(2);
    for (int i = 1; i <= 10; ++i) b.program.pointer_move(p.x, p.y - 5 * i, true), b.frames(1);
    b.program.pointer_button(p.x, p.y - 50, false, true);
    b.frames(60);
    CHECK(b.program.plan() == before);
    CHECK(b.centre("field.target.size.more").y < p.y - 40);

    const Point q = b.centre("field.antenna.frequency.more");
    b.program.pointer_button(q.x, q.y, true, true);
    b.frames(30);  // long enough for the press to go through
    const Plan held = b.program.plan();
    b.program.pinch(q.x, q.y, 1.2);
    b.frames(4);
    b.program.pointer_button(q.x, q.y, false, true);
    b.frames(6);
    CHECK(b.program.plan() == held);
}

TEST_CASE("every grip of every picture drags its number, and undo takes the drag back as one") {
    for (const char* view : {"view.beam", "view.pulse", "view.pair", "view.lanes"}) {
        std::vector<std::string> grips;
        {
            Bench b(1440, 900, false);
            b.press(view);
            for (const auto& c : nlohmann::json::parse(b.program.controls_json()))
                if (c["role"] == "slider") grips.push_back(c["id"]);
        }
        CHECK(!grips.empty());
        for (const std::string& id : grips) {
            Bench b(1440, 900, false);
            b.press(view);
            const Plan before = b.program.plan();
            const Point p = b.centre(id);
            b.program.pointer_move(p.x, p.y, false);
            b.frames(2);
            b.program.pointer_button(p.x, p.y, true, false);
            b.frames(2);
            for (int i = 1; i <= 8; ++i) b.program.pointer_move(p.x + 5 * i, p.y + 5 * i, false), b.frames(1);
            b.program.pointer_button(p.x + 40, p.y + 40, false, false);
            b.frames(4);
            INFO(view << " " << id);
            CHECK(!(b.program.plan() == before));
            b.press("undo");
            CHECK(b.program.plan() == before);
            b.press("redo");
            CHECK(!(b.program.plan() == before));
            // Whatever the drag set moving comes to rest: nothing is drawn any more.
            for (int i = 0; i < 200 && std::isfinite(b.program.wake_after()); ++i)
                b.frame(std::max(0.016, b.program.wake_after()));
            CHECK(std::isinf(b.program.wake_after()));
        }
    }
}

TEST_CASE("the keypad types a number; one that cannot be keeps its text and the plan as it was") {
    Bench b;
    b.tap(b.centre("field.target.depth"));
    for (const char* key : {"key.1", "key.point", "key.2"}) b.tap(b.centre(key));
    CHECK(b.value("typed") == "1.2");
    b.tap(b.centre("key.ok"));
    CHECK(b.program.plan().target.depth.likely == doctest::Approx(1.2));

    const Plan before = b.program.plan();
    const std::string answers = b.program.answers_json();
    b.press("field.target.depth");
    for (const char* key : {"key.9", "key.9", "key.9"}) b.press(key);
    b.press("key.ok");
    CHECK(b.value("typed") == "999");
    CHECK(b.program.plan() == before);
    CHECK(b.program.answers_json() == answers);
    b.press("close");
    CHECK(b.program.plan() == before);
}

TEST_CASE("on a desk a value is typed in its own place, and arrows nudge what was touched last") {
    Bench b(1440, 900, false);
    b.click(b.centre("field.target.size"));
    for (const char c : {'2', '0', '0'}) b.program.character(static_cast<unsigned>(c)), b.frames(2);
    b.strike(ImGuiKey_Enter);
    CHECK(b.program.plan().target.size == doctest::Approx(0.2));
    const double before = b.program.plan().target.size;
    b.click(b.centre("handle.target.depth"));
    const double depth = b.program.plan().target.depth.likely;
    b.strike(ImGuiKey_UpArrow);
    CHECK(b.program.plan().target.depth.likely > depth);
    CHECK(b.program.plan().target.size == before);
    b.strike(ImGuiKey_3);
    CHECK(b.value("view.pair") == "chosen");
}

TEST_CASE("a mend on a card changes the plan, and undo takes it back") {
    Bench b;
    int mended = 0;
    for (const auto& answer : nlohmann::json::parse(b.program.controls_json())) {
        const std::string id = answer["id"];
        if (id.rfind("answer.", 0) != 0) continue;
        b.press(id);
        if (b.control("mend.0").is_object()) {
            const Plan before = b.program.plan();
            b.press("mend.0");
            CHECK(!(b.program.plan() == before));
            b.press("close");
            b.press("undo");
            CHECK(b.program.plan() == before);
            ++mended;
        } else {
            b.press("close");
        }
    }
    CHECK(mended > 0);
}

TEST_CASE("an idle screen asks for no frame, in bounded time") {
    for (const bool touch : {true, false}) {
        Bench b(360, 640, touch);
        b.press("field.target.size.more");
        int drawn = 0;
        while (b.program.wake_after() < 1e9 && drawn < 60) {
            b.frame(std::max(0.016, b.program.wake_after()));
            ++drawn;
        }
        CHECK(drawn < 20);
        CHECK(std::isinf(b.program.wake_after()));
    }
}

TEST_CASE("plan and preferences are handed out to be kept, and come back") {
    Bench b;
    b.requests.clear();
    b.press("field.target.size.more");
    b.wait(0.5);
    std::string plan;
    for (const Request& r : b.requests)
        if (r.kind == Request::Kind::store && r.name == "plan") plan = r.text;
    REQUIRE(!plan.empty());
    b.press("menu");
    b.press("units.1");
    std::string likes;
    for (const Request& r : b.requests)
        if (r.kind == Request::Kind::store && r.name == "preferences") likes = r.text;
    REQUIRE(read_preferences(likes).units == UnitSystem::imperial);

    Program again(embedded::font_ttf());
    again.restore("preferences", likes);
    again.restore("plan", plan);
    CHECK(again.plan() == b.program.plan());
}

TEST_CASE("preferences read back as written, and rubbish gives the usual ones") {
    Preferences p;
    p.theme = Theme::dark;
    p.text_scale = 1.25;
    p.hint_seen = true;
    p.used("material", "wet-clay");
    p.used("material", "asphalt");
    CHECK(read_preferences(write_preferences(p)) == p);
    CHECK(read_preferences("{\"units\": 7, \"recent\": [1]}") == Preferences{});
    CHECK(read_preferences("\x00\xff") == Preferences{});
}

TEST_CASE("a broken file is refused with a sentence and the plan stays") {
    Bench b;
    const Plan before = b.program.plan();
    b.requests.clear();
    b.program.opened("rubbish.json", "{]");
    b.frames(3);
    CHECK(b.program.plan() == before);
    bool said = false;
    for (const Request& r : b.requests) said |= r.kind == Request::Kind::announce;
    CHECK(said);
}

TEST_CASE("undo keeps a plan that was still for a second, not one under way") {
    Plan a, b;
    b.target.size = 0.5;
    History history(a);
    history.watch(b, 0.0, false);
    history.watch(b, 0.5, false);
    CHECK(history.due(b, 0.5) == doctest::Approx(0.5));
    history.watch(b, 1.1, false);
    CHECK(std::isinf(history.due(b, 1.1)));
    CHECK(history.undo(b) == a);
    CHECK(history.redo(a) == b);
}

TEST_CASE("ears of a concave polygon cover its area, once") {
    const std::vector<Point> arrow{{0, 0}, {4, 0}, {4, 4}, {2, 1}, {0, 4}};
    const std::vector<int> t = triangles_of(arrow);
    REQUIRE(t.size() == 9);
    double area = 0;
    for (std::size_t i = 0; i < t.size(); i += 3) {
        const Point p = arrow[t[i]], q = arrow[t[i + 1]], r = arrow[t[i + 2]];
        area += std::abs((q.x - p.x) * (r.y - p.y) - (q.y - p.y) * (r.x - p.x)) / 2;
    }
    CHECK(area == doctest::Approx(10.0));  // 4 x 4 less the notch of base 4 and height 3
}

TEST_CASE("Pair shows the section, measures it once the plan rests, and then is still") {
    Bench b;
    b.press("view.pair");
    b.wait(2.0);
    CHECK(b.value("section.gain") == "Even gain");
    CHECK(b.value("picture").find(" raw, ") != std::string::npos);
    CHECK(std::isinf(b.program.wake_after()));
    b.press("section.gain");
    CHECK(b.value("section.gain") == "Strong gain");
    b.press("section.layers");
    CHECK(b.value("section.layers") == "With layers");
    b.press("section.focused");
    CHECK(b.value("section.focused") == "Focused");
    b.press("section.field");
    CHECK(b.value("section.field") == "Field across");
    b.wait(2.0);
    CHECK(b.value("picture").find(" raw, ") != std::string::npos);

    // While a finger moves the gap the verdict is measured, and the least gaps stay: they do not depend on it.
    b.press("section.field");
    b.wait(2.0);
    const Point grip = b.centre("handle.target.gap");
    b.program.pointer_button(grip.x, grip.y, true, true);
    b.frames(3);
    b.program.pointer_move(grip.x + 20, grip.y, true);
    b.frames(3);
    CHECK(b.program.plan().target.gap > 0.4);
    const auto gap = say(b.program.plan().target.gap, Quantity::length, UnitSystem::metric);
    CHECK(b.value("picture").find("Two at " + gap) != std::string::npos);
    CHECK(b.value("picture").find(" raw, ") != std::string::npos);
    CHECK(b.program.answers_json().find("apart.focused") != std::string::npos);
    b.program.pointer_button(grip.x + 20, grip.y, false, true);
    b.wait(2.0);
    CHECK(b.value("picture").find(" raw, ") != std::string::npos);

    // They do depend on the depth; when the finger lifts, they are measured anew.
    const Point deep = b.centre("handle.target.depth");
    b.program.pointer_button(deep.x, deep.y, true, true);
    b.frames(3);
    b.program.pointer_move(deep.x, deep.y + 20, true);
    b.frames(3);
    CHECK(b.value("picture").find("Two at " + gap) != std::string::npos);
    CHECK(b.value("picture").find(" focused.") == std::string::npos);
    CHECK(b.program.answers_json().find("apart.focused") == std::string::npos);
    b.program.pointer_button(deep.x, deep.y + 20, false, true);
    b.wait(2.0);
    CHECK(b.value("picture").find(" raw, ") != std::string::npos);
    CHECK(b.program.answers_json().find("apart.focused") != std::string::npos);
}

TEST_CASE("while the section is computed elsewhere the screen goes on, says so, and keeps the last one") {
    Bench b(1440, 900, false);
    b.answers = false;
    b.press("view.pair");
    REQUIRE(b.orders.size() == 1);
    CHECK(b.value("section.gain") == "(not there)");
    b.wait(3.0);
    CHECK(b.orders.size() == 1);  // one is out at a time
    CHECK(b.value("picture").find("being computed") != std::string::npos);
    CHECK(std::isinf(b.program.wake_after()));  // and an idle screen waits without drawing
    b.program.reckoned(b.desk.answer(b.orders.back()));
    CHECK(b.program.wake_after() == 0.0);
    b.frame();
    CHECK(b.value("section.gain") == "Even gain");
    REQUIRE(b.orders.size() == 2);                                          // its focused picture
    CHECK(b.value("picture").find("being computed") == std::string::npos);  // not yet: it has just begun

    // Changes wait for the answer, and the last of them wins.
    b.program.reckoned(b.desk.answer(b.orders.back()));
    b.wait(0.6);
    const std::size_t before = b.orders.size();
    for (int i = 0; i < 5; ++i) b.press("field.target.depth.more");
    CHECK(b.orders.size() == before);
    CHECK(b.value("section.gain") == "Even gain");  // the last section is still there
    b.program.reckoned(b.desk.answer(b.orders.back()));
    b.frames(2);
    REQUIRE(b.orders.size() == before + 1);
    REQUIRE(read_order(b.orders.back()));
    CHECK(read_order(b.orders.back())->plan.target.depth == b.program.plan().target.depth);
    // What was measured of the plan before does not settle the answers of this one.
    CHECK(b.program.answers_json().find("apart.focused") == std::string::npos);
    b.program.reckoned(b.desk.answer(b.orders.back()));
    b.answers = true;
    b.wait(2.0);
    b.press("section.gain");
    b.wait(2.0);
    CHECK(b.program.answers_json().find("apart.focused") != std::string::npos);
}

TEST_CASE("an order of a plan gone by is given up after a while, and its late answer is passed over") {
    Bench b(1440, 900, false);
    b.answers = false;
    b.press("view.pair");
    b.press("field.target.depth.more");
    REQUIRE(b.orders.size() == 1);
    b.wait(1.5);
    REQUIRE(b.orders.size() == 2);
    b.program.reckoned(b.desk.answer(b.orders[0]));
    b.frame();
    CHECK(b.value("section.gain") == "(not there)");
    b.program.reckoned(b.desk.answer(b.orders[1]));
    b.frame();
    CHECK(b.value("section.gain") == "Even gain");
}

TEST_CASE("an answer that is none says so, and is not asked for again until something changes") {
    for (const std::string& wrong : {std::string(), std::string("gg-pair\n rubbish")}) {
        Bench b;
        b.answers = false;
        b.press("view.pair");
        REQUIRE(b.orders.size() == 1);
        b.program.reckoned(wrong);
        b.wait(2.0);
        CHECK(b.orders.size() == 1);
        CHECK(b.value("section.gain") == "(not there)");
        CHECK(std::isinf(b.program.wake_after()));
        b.press("field.target.gap.more");
        CHECK(b.orders.size() == 2);
        b.program.reckoned(b.desk.answer(b.orders.back()));
        b.frame();
        CHECK(b.value("section.gain") == "Even gain");
    }
}

TEST_CASE("another plan altogether does not wear the section of the one before") {
    Bench b(1440, 900, false);
    b.press("view.pair");
    b.wait(2.0);
    CHECK(b.value("section.gain") == "Even gain");
    b.answers = false;
    b.program.opened("deck", demos()[1].json);
    b.frames(3);
    CHECK(b.value("section.gain") == "(not there)");
    CHECK(b.value("picture").find(" raw") == std::string::npos);
}

TEST_CASE("Pair without a section has no switches for it, and keeps its picture") {
    Bench b;
    Plan plan = read_plan(demos().front().json).plan;
    plan.target.shape = TargetShape::flat;
    b.program.opened("flat", write_plan(plan));
    b.press("view.pair");
    b.wait(6.0);  // the notice of opening goes
    CHECK(b.value("section.gain") == "(not there)");
    CHECK(b.value("picture").find("Two neighbours") != std::string::npos);
    CHECK(std::isinf(b.program.wake_after()));
}

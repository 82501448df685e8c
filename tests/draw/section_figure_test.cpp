#include <doctest/doctest.h>

#include <algorithm>

#include "pictures.hpp"

using namespace gg;

namespace {

/// Quick to compute: few traces, a short window.
Plan quick_plan() {
    Plan plan = bars_plan();
    plan.target.count = 2;
    plan.pass.step = 0.02;
    plan.pass.window = 6e-9;
    plan.pass.samples = 128;
    return plan;
}

const PairSection& quick_section() {
    static const PairSection pair = [] {
        PairSection out = pair_section(quick_plan(), Detail::full, Polarisation::along);
        add_focused(out);
        add_separation(out, quick_plan());
        return out;
    }();
    return pair;
}

Drawn drawn(const FigureStyle& style) {
    const Plan plan = quick_plan();
    return draw(views()[static_cast<std::size_t>(View::pair)], plan, answers_for(plan), style);
}

std::size_t count_of(const std::string& text, std::string_view word) {
    std::size_t n = 0;
    for (std::size_t at = text.find(word); at != text.npos; at = text.find(word, at + 1)) ++n;
    return n;
}

}  // namespace

TEST_CASE("a section is drawn sound at every size, raw beside focused where there is room for both") {
    REQUIRE(quick_section().section.ok());
    for (const Box& size : {Box{0, 0, 344, 300}, Box{0, 0, 820, 760}, Box{0, 0, 90, 60}, Box{0, 0, 30, 500},
                            Box{0, 0, 0, 0}, Box{0, 0, 700, 120}}) {
        for (const bool dark : {false, true}) {
            for (const bool focused : {false, true}) {
                FigureStyle style = style_of(size.width, size.height);
                style.dark = dark;
                style.section = &quick_section();
                style.look = {dark ? Gain::strong : Gain::recorded, dark, focused};
                const Drawn picture = drawn(style);
                CHECK_MESSAGE(xml_fault(picture.svg).empty(), xml_fault(picture.svg));
                CHECK(picture.svg.find("nan") == std::string::npos);
                CHECK(picture.svg.size() < 2000000);
                for (const Handle& h : picture.figure.handles) CHECK(style.box.holds(h.at));
                if (size.height < 300) continue;
                CHECK(count_of(picture.svg, "<image") == (size.width > 560 ? 2 : size.width > 300 ? 1 : 0));
            }
        }
    }
}

TEST_CASE("every look at a section is a picture of its own") {
    std::vector<std::string> seen;
    for (const Gain gain : {Gain::recorded, Gain::even, Gain::strong}) {
        for (const bool layers : {false, true}) {
            FigureStyle style = style_of(344, 300);
            style.section = &quick_section();
            style.look = {gain, layers, false};
            seen.push_back(drawn(style).svg);
            CHECK(seen.back().find("Raw") != std::string::npos);
            style.look.focused = true;
            if (layers) continue;  // the image is of the targets alone
            seen.push_back(drawn(style).svg);
            CHECK(seen.back().find("Focused") != std::string::npos);
        }
    }
    std::sort(seen.begin(), seen.end());
    CHECK(std::adjacent_find(seen.begin(), seen.end()) == seen.end());
}

TEST_CASE("the words give the measured gaps beside the rules, and the handles stay") {
    FigureStyle style = style_of(820, 760);
    style.section = &quick_section();
    const Figure figure = drawn(style).figure;
    const Separation& found = *quick_section().separation;
    REQUIRE(found.least_raw.ok());
    CHECK(figure.description.find(say(found.least_raw.value, Quantity::length, UnitSystem::metric) + " raw") !=
          std::string::npos);
    CHECK(figure.description.find("half the wavelength") != std::string::npos);
    CHECK(figure.description.find("no power budget") != std::string::npos);
    const Plan plan = quick_plan();
    for (const char* key : {"target.gap", "target.depth"}) {
        const auto handle =
            std::find_if(figure.handles.begin(), figure.handles.end(), [&](const Handle& h) { return h.field == key; });
        REQUIRE(handle != figure.handles.end());
        CHECK(handle->start == doctest::Approx(*number_at(plan, key)));
    }
}

TEST_CASE("a coarse section says so, and a refused one leaves the travel times") {
    FigureStyle style = style_of(820, 760);
    const std::string travel_times = drawn(style).svg;
    const PairSection coarse = pair_section(quick_plan(), Detail::coarse, Polarisation::across);
    style.section = &coarse;
    CHECK(drawn(style).svg.find("coarse while you drag") != std::string::npos);
    Plan flat = quick_plan();
    flat.target.shape = TargetShape::flat;
    const PairSection refused = pair_section(flat, Detail::full, Polarisation::along);
    CHECK_FALSE(refused.section.reason.empty());
    style.section = &refused;
    CHECK(drawn(style).svg == travel_times);
}

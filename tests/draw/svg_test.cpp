#include <doctest/doctest.h>

#include <cmath>

#include "draw/png.hpp"
#include "pictures.hpp"

using namespace gg;

TEST_CASE("the XML reader of these tests finds faults") {
    CHECK(xml_fault("<a b=\"1\"><c/></a>").empty());
    for (const char* bad : {"", "<a>", "<a></b>", "<a/><b/>", "<a>&</a>", "<a b=\"<\"/>", "</a>", "x<a/>"})
        CHECK_MESSAGE(!xml_fault(bad).empty(), bad);
}

TEST_CASE("texts are escaped and control characters left out") {
    SvgCanvas canvas(100, 50, "<&\">", "a < b\x01");
    canvas.text({1, 2}, "5 < 6 & \"so\"", {});
    const std::string svg = canvas.finish();
    CHECK(xml_fault(svg).empty());
    CHECK(svg.find("5 &lt; 6 &amp; &quot;so&quot;") != std::string::npos);
    CHECK(svg.find("<desc>a &lt; b</desc>") != std::string::npos);
    CHECK(svg.find("role=\"img\"") != std::string::npos);
}

TEST_CASE("what is no number is not drawn") {
    SvgCanvas canvas(100, 50, "t");
    const double bad = std::nan("");
    canvas.disc({bad, 1}, 2, {});
    canvas.box({0, 0, bad, 5}, {}, 0);
    canvas.text({1, bad}, "x", {});
    canvas.ring({1, 1}, INFINITY, {});
    const Point points[] = {{0, 0}, {bad, 3}, {2, 2}};
    canvas.line(points, {}, false);
    const std::string svg = canvas.finish();
    CHECK(svg.find("nan") == std::string::npos);
    CHECK(svg.find("inf") == std::string::npos);
    CHECK(svg.find("points=\"0,0 2,2\"") != std::string::npos);
}

TEST_CASE("clips left open are closed") {
    SvgCanvas canvas(100, 50, "t");
    canvas.push_clip({0, 0, 5, 5});
    canvas.push_clip({0, 0, -1, std::nan("")});
    CHECK(xml_fault(canvas.finish()).empty());
    canvas.pop_clip();
    canvas.pop_clip();
    canvas.pop_clip();
    CHECK(xml_fault(canvas.finish()).empty());
}

TEST_CASE("texts are as wide as the typeface makes them") {
    const SvgCanvas canvas(1, 1, "t");
    // Advance widths as a font viewer gives them for DejaVu Sans: space 651, zero 1303, M 1767, degree sign 1024 of
    // 2048 units.
    CHECK(canvas.measure(" 0M\u00b0", {{}, 2048}) == doctest::Approx(651 + 1303 + 1767 + 1024));
    CHECK(canvas.measure("0", {{}, 2048, Across::left, Down::top, true}) > canvas.measure("0", {{}, 2048}));
    CHECK(canvas.measure("", {}) == 0.0);
}

TEST_CASE("a picture of pixels becomes a PNG, and sizes that do not fit become none") {
    const Colour pixels[] = {{255, 0, 0}, {0, 255, 0}};
    // The same two pixels through an independent zlib (Python's): stored block, CRC and Adler sums included.
    CHECK(png_address(2, 1, pixels) ==
          "data:image/png;base64,iVBORw0KGgoAAAANSUhEUgAAAAIAAAABCAYAAAD0In+KAAAAFElEQVR4AQEJAPb/AP8AAP8A/wD/EPgD/"
          "dlkvFMAAAAASUVORK5CYII=");
    CHECK(png_address(3, 1, pixels).empty());
    CHECK(png_address(0, 0, {}).empty());
}

/// Processor time to build one frame of each view, without a window: layout, picture and vertices, nothing drawn.
#include <cstdio>
#include <ctime>
#include <string>

#include "draw/figure.hpp"
#include "paper/pair_desk.hpp"
#include "ui/program.hpp"
#include "wave/embedded.hpp"

int main() {
    using namespace gg;
    for (const bool touch : {true, false}) {
        Program program(embedded::font_ttf());
        Surface surface;
        surface.width = touch ? 360 : 1440;
        surface.height = touch ? 640 : 900;
        surface.pixel_ratio = touch ? 3 : 1;
        surface.touch = touch;
        program.set_surface(surface);
        double now = 0.0;
        PairDesk desk;
        const auto frame = [&] {
            program.frame(now += 0.016);
            for (const Request& request : program.take_requests())
                if (request.kind == Request::Kind::reckon) program.reckoned(desk.answer(request.text));
        };
        for (const ViewRow& view : views()) {
            program.press("view." + std::string(view.id));
            for (int i = 0; i < 90; ++i) frame();  // Pair's section and its searches come to rest, too
            const std::clock_t begin = std::clock();
            constexpr int runs = 100;
            for (int i = 0; i < runs; ++i) frame();
            std::printf("%-8s %-6s %8.3f ms a frame\n", touch ? "phone" : "desktop", view.id,
                        1e3 * static_cast<double>(std::clock() - begin) / CLOCKS_PER_SEC / runs);
        }
    }
}

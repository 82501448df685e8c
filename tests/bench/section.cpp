/// Time of the full-wave section: the standard one, how it grows, and what is built on it. Prints, checks nothing.
///   bench_section [--meep | SECONDS]
///   --meep    runs tests/reference/meep/time_section.py beside it, minutes long (needs python3-meep)
///   SECONDS   what the grid solver took for the same section, where that is known already
/// Processor time, the least of several runs, so that other work on the machine disturbs it little. The solver's
/// traces are 2.3 % off at that price (time_section.py --error), the section's less than 0.5 %.
#include <cstdio>
#include <cstdlib>
#include <cstring>
#include <ctime>
#include <string>

#include "echo/apart.hpp"

namespace {

using namespace gg;

/// Two water pipes in the second of three layers, 256 traces of 512 samples: scenes.json's "timed".
Scene standard() {
    Scene s;
    s.pulse.centre_frequency = 400e6;
    s.separation = 0.16;
    s.height = 0.02;
    s.ground.slabs = {
        {constant_material(4, 0.001), 0.3}, {constant_material(9, 0.005), 0.9}, {constant_material(16, 0.01), 0.0}};
    const Material water = constant_material(81, 0.02);
    s.targets = {{-0.2, 0.8, 0.055, water, {}}, {0.2, 0.8, 0.055, water, {}}};
    s.sampling = {-2.56, 0.02, 256, 0.0, 512 * 7.8125e-11, 512};
    return s;
}

/// Milliseconds.
template <class F>
double time_of(const F& f, int runs = 9) {
    double least = 1e9;
    for (int i = 0; i < runs; ++i) {
        const std::clock_t begin = std::clock();
        f();
        least = std::min(least, 1e3 * static_cast<double>(std::clock() - begin) / CLOCKS_PER_SEC);
    }
    return least;
}

volatile double kept = 0.0;  // results go here, so that none is optimised away

double time_section(const Scene& s, int runs = 5) {
    return time_of(
        [&] {
            const Section section = section_of(s);
            if (!section.ok()) std::printf("refused: %s\n", section.reason.c_str());
            if (section.ok()) kept = kept + (section.targets.empty() ? section.layers[1] : section.targets[1]);
        },
        runs);
}

void growth() {
    const auto row = [](const char* what, double value, const Scene& s) {
        std::printf("  %-22s %8g %9.2f ms\n", what, value, time_section(s));
    };
    Scene s = standard();
    for (const int n : {32, 64, 128, 256, 512, 1024}) {  // the same line, walked more finely
        s.sampling.traces = n;
        s.sampling.step = 5.12 / n;
        row("traces, same line", n, s);
    }
    s = standard();
    for (const int n : {64, 128, 256, 512}) {
        s.sampling.traces = n;
        s.sampling.first = -0.01 * n;
        row("traces, longer line", n, s);
    }
    s = standard();
    for (const int n : {256, 512, 1024, 2048}) {
        s.sampling.samples = n;
        row("samples, same window", n, s);
    }
    s = standard();
    for (const int n : {256, 512, 1024}) {
        s.sampling.window = n * 7.8125e-11;
        s.sampling.samples = n;
        row("samples, longer window", n, s);
    }
    for (const int n : {0, 1, 2, 4, 6}) {
        s = standard();
        s.targets.resize(static_cast<std::size_t>(n), s.targets[0]);
        for (int i = 0; i < n; ++i) s.targets[static_cast<std::size_t>(i)].x = 0.4 * i - 0.2 * (n - 1);
        row("targets", n, s);
    }
    for (const int n : {1, 2, 3, 6, 10}) {
        s = standard();
        s.ground.slabs.resize(1);
        s.ground.slabs[0].thickness = 1.2;
        for (int i = 1; i < n; ++i)
            s.ground.slabs.push_back({constant_material(9.0 + (i & 1 ? 4.0 : 0.0), 0.005), 0.3});
        row("layers", n, s);
    }
    for (const double f : {100e6, 200e6, 400e6, 800e6, 1600e6}) {
        s = standard();
        s.pulse.centre_frequency = f;
        row("centre frequency, MHz", f / 1e6, s);
    }
    s = standard();
    s.polarisation = Polarisation::across;
    row("field across", 1, s);
}

double grid_solver_seconds() {
    std::FILE* pipe = popen("/usr/bin/python3 " GG_SOURCE_DIR "/tests/reference/meep/time_section.py", "r");
    char line[256];
    double last = 0.0;
    while (pipe && std::fgets(line, sizeof line, pipe)) {
        const double value = std::strtod(line, nullptr);
        if (value > 0.0) last = value;  // the solver says good-bye in words
    }
    return pipe && pclose(pipe) == 0 ? last : 0.0;
}

}  // namespace

int main(int argc, char** argv) {
    const Scene s = standard();
    const Section section = section_of(s);
    const double plain = time_section(s, 15);
    std::printf("standard section        %9.2f ms\n", plain);
    std::printf("focused                 %9.2f ms\n", time_of([&] { kept = kept + focused(s, section.targets).peak; }));
    const auto gap = [&](const char* what, Reading reading) {
        Value value;
        const double ms = time_of([&] { value = smallest_gap(s, reading); }, 3);
        std::printf("smallest gap, %-9s %9.2f ms  (%.3f m)\n", what, ms, value.value);
    };
    gap("raw", Reading::raw);
    gap("focused", Reading::focused);
    if (argc > 1) {
        const double grid = std::strcmp(argv[1], "--meep") == 0 ? grid_solver_seconds() : std::strtod(argv[1], nullptr);
        if (!(grid > 0.0)) {
            std::fprintf(stderr, "no time of the grid solver: is python3-meep there?\n");
            return 1;
        }
        std::printf("grid solver %.4g s: %.3g times as long\n", grid, 1e3 * grid / plain);
        return 0;
    }
    growth();
    return 0;
}

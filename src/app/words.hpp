#pragma once
/// From words to an order: what the command line was asked to do.
#include <string>
#include <vector>

#include "app/platform.hpp"
#include "draw/units.hpp"
#include "paper/section_file.hpp"

namespace gg {

enum class Command : unsigned char {
    window = 1,
    answers = 2,
    picture = 4,
    check = 8,
    demo = 16,
    help = 32,
    version = 64,
    section = 128
};

/// One call, understood.
struct Order {
    Command command = Command::window;
    std::string plan;                  ///< file name, "-" for standard input; the demo's name with `demo`
    std::string view;                  ///< id of the view, with `picture`
    std::string output;                ///< file name; empty: standard output
    double width = 820, height = 640;  ///< css px, with `picture`
    bool dark = false;
    UnitSystem units = UnitSystem::metric;
    SectionOrder section;
    platform::Options window;
    std::string fault;  ///< one sentence; not empty: the call was not understood
};

Order understand(const std::vector<std::string>& words);

/// What --help prints.
std::string help_text();

}  // namespace gg

#pragma once
/// The one seam to the outside: one source per platform (platform_web.cpp, platform_desktop.cpp). Nothing else in src
/// knows where it runs.
#include <string>
#include <string_view>

namespace gg::platform {

/// Opens the window or page surface, runs the interactive program until it is closed, gives its exit status.
/// @param plan_file  plan to open, or empty for the last one kept on this device, else the first demo
struct Options {
    std::string plan_file;
    std::string shot_file;    ///< desktop: write a PPM picture of the window here, then close; empty: not
    std::string script_file;  ///< desktop: pointer and key script to play first (tests)
    int width = 1440, height = 900;
    double scale = 0.0;  ///< 0: the monitor's
    bool dark = false;
};
int run_window(const Options& options);

/// Font bytes built into the program.
std::string_view font();

}  // namespace gg::platform

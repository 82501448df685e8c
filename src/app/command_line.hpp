#pragma once
/// The command line as a function of its words and streams; the program's main() hands over its own.
#include <functional>
#include <iosfwd>
#include <string>
#include <vector>

#include "app/platform.hpp"

namespace gg {

/// Exit statuses.
enum Exit : int {
    exit_fine = 0,
    exit_poor = 1,   ///< check: something in the plan is graded poor, or is a fault
    exit_failed = 2  ///< wrong words, or a file that could not be read or written
};

using OpenWindow = std::function<int(const platform::Options&)>;

/// Runs one command and gives its exit status. Never throws for what is in a file or in `words`.
/// @param words        without the program's own name
/// @param open_window  what a call for the window is handed to
int run_command_line(const std::vector<std::string>& words, std::istream& in, std::ostream& out, std::ostream& err,
                     const OpenWindow& open_window);

}  // namespace gg

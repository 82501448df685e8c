#include <iostream>

#include "app/command_line.hpp"

int main(int count, char** words) {
    return gg::run_command_line({words + 1, words + count}, std::cin, std::cout, std::cerr, gg::platform::run_window);
}

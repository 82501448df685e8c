#pragma once
/// Files of assets/ that the build puts into the program as bytes (src/cmake/embed.cmake).
#include <span>
#include <string_view>

namespace gg::embedded {

struct File {
    std::string_view name, bytes;
};

std::string_view catalogue_json();        ///< assets/catalogue.json
std::span<const File> demo_files_json();  ///< assets/demo-*.json, by name
std::string_view font_ttf();              ///< the subset typeface, built from its package

}  // namespace gg::embedded

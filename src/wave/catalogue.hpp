#pragma once
/// The grounds and materials that ship with the tool: rows of assets/catalogue.json, each with its citation.
#include <span>
#include <string>
#include <vector>

#include "wave/material.hpp"

namespace gg {

/// How a layer is drawn, so that layers are told apart without colour.
enum class Texture : std::uint8_t {
    plain,
    dots,
    coarse_dots,
    dashes,
    triangles,
    blocks,
    waves,
    crosses,
    flakes,
    grass
};

struct CatalogueRow {
    std::string id;     ///< machine name, as in plan files: "wet-clay"
    std::string name;   ///< "Wet clay"
    std::string group;  ///< "Soil", "Sand and gravel", "Rock", "Building", "Water and ice", "Other"
    Texture texture = Texture::plain;
    Material material;       ///< model, coefficients and band; inputs at their likely values
    Inputs<Range> ranges{};  ///< of the inputs that the model takes
    std::string source;      ///< the citation; says "from memory" where it was not looked up
    bool from_memory = false;
};

/// All rows, in the order of the file, parsed once. At least 30; the first error in the embedded file gives an empty
/// span.
std::span<const CatalogueRow> catalogue();
/// The row of that id, or null.
const CatalogueRow* find_material(std::string_view id);

}  // namespace gg

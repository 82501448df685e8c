#include "ui/typeface.hpp"

#include <imgui.h>

#include <algorithm>
#include <cmath>

namespace gg {

// The blocks that the subset draws from (src/cmake/ui.cmake); code points without a glyph cost nothing.
static constexpr ImWchar blocks[] = {0x20,   0x7E,   0xA0,   0x3FF,  0x1D62, 0x1D6A, 0x2010,
                                     0x22FF, 0x2300, 0x2330, 0x25A0, 0x2718, 0};

// Sizes above reading size show numbers with their units only.
static constexpr ImWchar number_blocks[] = {0x20, 0x7E, 0xA0, 0xFF, 0x2013, 0x2013, 0x2026, 0x2026, 0x2212, 0x2212, 0};
static constexpr double reading_size = 1.3;  // times the smallest but one

void build_typeface(std::string_view font, const std::vector<double>& sizes, double pixel_ratio) {
    ImFontAtlas& atlas = *ImGui::GetIO().Fonts;
    atlas.Clear();
    atlas.Flags |= ImFontAtlasFlags_NoMouseCursors;
    std::vector<float> pixels;
    for (double size : sizes) {
        const float px = std::clamp(static_cast<float>(std::round(size * box_per_em * pixel_ratio)), 6.0f, 200.0f);
        if (std::find(pixels.begin(), pixels.end(), px) == pixels.end()) pixels.push_back(px);
    }
    for (float px : pixels) {
        ImFontConfig config;
        config.FontDataOwnedByAtlas = false;
        // Above about 28 px the hinting-free outlines are smooth without the second sample.
        config.OversampleH = px > 28.0f ? 1 : 2;
        config.PixelSnapH = px <= 28.0f;
        config.GlyphRanges = pixels.size() > 2 && px > reading_size * pixels[1] ? number_blocks : blocks;
        // The atlas only reads the bytes while it does not own them.
        atlas.AddFontFromMemoryTTF(const_cast<char*>(font.data()), static_cast<int>(font.size()), px, &config);
    }
    if (atlas.Fonts.empty()) atlas.AddFontDefault();
    atlas.Build();
}

ImFont* font_for(double pixels) {
    ImFontAtlas& atlas = *ImGui::GetIO().Fonts;
    ImFont* best = nullptr;
    for (ImFont* font : atlas.Fonts) {
        const bool fits = font->FontSize >= pixels - 0.75;
        const bool best_fits = best && best->FontSize >= pixels - 0.75;
        if (!best || (fits && (!best_fits || font->FontSize < best->FontSize)) ||
            (!fits && !best_fits && font->FontSize > best->FontSize))
            best = font;
    }
    return best;
}

}  // namespace gg

#include "ui/theme.hpp"

#include <imgui.h>

namespace gg {

static ImVec4 shade(Colour c, double share = 1.0) {
    return {static_cast<float>(c.r) / 255.0f, static_cast<float>(c.g) / 255.0f, static_cast<float>(c.b) / 255.0f,
            static_cast<float>(c.a / 255.0 * share)};
}

void apply_theme(const Palette& colours, double pixel_ratio) {
    const auto px = [pixel_ratio](double v) { return static_cast<float>(v * pixel_ratio); };
    ImGuiStyle& style = ImGui::GetStyle();
    style = ImGuiStyle();
    style.WindowPadding = {0, 0};
    style.WindowBorderSize = 0;
    style.WindowMinSize = {1, 1};
    style.FrameRounding = px(6);
    style.FrameBorderSize = px(1.5);
    style.TouchExtraPadding = {px(2), px(2)};
    for (ImVec4& colour : style.Colors) colour = shade(colours.ink);
    style.Colors[ImGuiCol_Text] = shade(colours.ink);
    style.Colors[ImGuiCol_FrameBg] = shade(colours.paper);
    style.Colors[ImGuiCol_Border] = shade(colours.wave);
    style.Colors[ImGuiCol_BorderShadow] = shade(colours.paper, 0.0);
    style.Colors[ImGuiCol_TextSelectedBg] = shade(colours.wave_soft);
    style.Colors[ImGuiCol_WindowBg] = shade(colours.paper, 0.0);
    style.Colors[ImGuiCol_NavHighlight] = shade(colours.wave, 0.0);
}

}  // namespace gg

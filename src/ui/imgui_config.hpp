#pragma once
/// Dear ImGui's compile-time settings (IMGUI_USER_CONFIG): the same for its own sources, our rooms and the back end.
#define IMGUI_DISABLE_OBSOLETE_FUNCTIONS
#define IMGUI_DISABLE_DEMO_WINDOWS
#define IMGUI_DISABLE_DEBUG_TOOLS
#define IMGUI_DISABLE_FILE_FUNCTIONS
#define IMGUI_DISABLE_DEFAULT_SHELL_FUNCTIONS
/// OpenGL ES 3 has no vertex offset: 16-bit indices would overflow at 64 k vertices.
#define ImDrawIdx unsigned int

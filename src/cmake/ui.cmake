# Dear ImGui and the typeface, both from Debian packages, and the room `ui` on top of them.
set(GG_IMGUI ${CMAKE_BINARY_DIR}/imgui CACHE PATH "folder of the Dear ImGui source; fetched there when empty")
execute_process(COMMAND bash ${CMAKE_SOURCE_DIR}/src/cmake/fetch_imgui.sh ${GG_IMGUI} RESULT_VARIABLE failed)
if(failed)
  message(FATAL_ERROR "Dear ImGui could not be fetched into ${GG_IMGUI}; give a folder that holds it with -DGG_IMGUI=, "
    "or build without the window and the page with -DGG_UI=OFF")
endif()

add_library(gg_imgui STATIC ${GG_IMGUI}/imgui.cpp ${GG_IMGUI}/imgui_draw.cpp ${GG_IMGUI}/imgui_tables.cpp ${GG_IMGUI}/imgui_widgets.cpp)
target_include_directories(gg_imgui SYSTEM PUBLIC ${GG_IMGUI})
target_include_directories(gg_imgui PUBLIC ${CMAKE_SOURCE_DIR}/src)
target_compile_definitions(gg_imgui PUBLIC IMGUI_USER_CONFIG="ui/imgui_config.hpp")
target_compile_options(gg_imgui PRIVATE -w)

# The OpenGL back end: desktop GL 3 (it loads libGL itself), WebGL 2 on the page.
add_library(gg_imgui_gl STATIC EXCLUDE_FROM_ALL ${GG_IMGUI}/backends/imgui_impl_opengl3.cpp)
target_include_directories(gg_imgui_gl SYSTEM PUBLIC ${GG_IMGUI}/backends)
target_link_libraries(gg_imgui_gl PUBLIC gg_imgui ${CMAKE_DL_LIBS})
target_compile_options(gg_imgui_gl PRIVATE -w)
if(EMSCRIPTEN)
  target_compile_definitions(gg_imgui_gl PUBLIC IMGUI_IMPL_OPENGL_ES3)
endif()

# DejaVu Sans, cut to the characters a plan needs: digits of one width, Latin 1, Greek, powers, mathematics, arrows, signs.
set(GG_TYPEFACE /usr/share/fonts/truetype/dejavu/DejaVuSans.ttf)
foreach(need "${GG_TYPEFACE};fonts-dejavu-core" "/usr/bin/pyftsubset;fonttools")
  list(GET need 0 path)
  list(GET need 1 package)
  if(NOT EXISTS ${path})
    message(FATAL_ERROR "${path} is missing: install the Debian package ${package}, or run tests/run.sh, which does")
  endif()
endforeach()
set(GG_FONT ${CMAKE_BINARY_DIR}/font.ttf)
add_custom_command(OUTPUT ${GG_FONT} DEPENDS ${GG_TYPEFACE}
  COMMAND /usr/bin/pyftsubset ${GG_TYPEFACE} --output-file=${GG_FONT} --layout-features= --no-hinting --desubroutinize
    --name-IDs=0,1,2,13,14 --drop-tables+=GPOS,GSUB,GDEF,kern,MATH,STAT
    "--unicodes=20-7E,A0-FF,131,2BC,391-3A9,3B1-3C9,3D5,1D62-1D6A,2010-2015,2018-201E,2020-2022,2026,2030,2032,2033,203A,2039,2044,2070-2071,2074-208E,2090-209C,20AC,2103,2126,2190-2199,21B5,21BA,21BB,21D0,21D2,21D4,2200,2202,2205-2208,220F,2211-2213,2215,2217-221E,2220,2227-222B,2234,223C,2248,2260-2265,226A,226B,2282,22A5,22C5,2300,2318,2326,232B,25A0,25A1,25B2,25B4,25B6,25B8,25BC,25BE,25C0,25C2,25C6,25CB,25CF,25D0,2630,2699,26A0,2713,2717"
  VERBATIM)
gg_room(ui paper)
target_link_libraries(gg_ui PUBLIC gg_imgui)
gg_embed(gg_ui font_ttf ${GG_FONT})

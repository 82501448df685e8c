# The page: the program as WebAssembly, then what web/build.mjs makes of it (a hashed folder, and one self-contained file).
# Physics keeps the -O3 of a Release build; what is drawn and written once a frame is built for size instead.
# Emscripten's own scripts are written for Debian's node, which knows where Debian's JavaScript packages are; others are told.
set_property(GLOBAL PROPERTY RULE_LAUNCH_LINK "${CMAKE_COMMAND} -E env NODE_PATH=/usr/share/nodejs")
foreach(room draw paper ui imgui imgui_gl)
  if(TARGET gg_${room})
    target_compile_options(gg_${room} PRIVATE -Oz)
  endif()
endforeach()

target_compile_options(gg_echo PRIVATE -msimd128)  # the section's inner sums, four floats at a time; in every browser since 2023

if(NOT TARGET gg_ui)
  return()
endif()

add_executable(groundgrain ${CMAKE_SOURCE_DIR}/src/app/platform_web.cpp)
target_link_libraries(groundgrain PRIVATE gg_ui gg_imgui_gl)
target_compile_options(groundgrain PRIVATE -Oz)
target_link_options(groundgrain PRIVATE -Oz --no-entry -sMODULARIZE=1 -sEXPORT_NAME=createProgram -sENVIRONMENT=web,worker
  -sFILESYSTEM=0 -sMALLOC=emmalloc -sALLOW_MEMORY_GROWTH=1 -sABORTING_MALLOC=0 -sTOTAL_STACK=1MB
  -sMIN_WEBGL_VERSION=2 -sMAX_WEBGL_VERSION=2 -sGL_SUPPORT_AUTOMATIC_ENABLE_EXTENSIONS=0
  -sGL_SUPPORT_SIMPLE_ENABLE_EXTENSIONS=0 -sGL_TRACK_ERRORS=0 -sTEXTDECODER=2 -sSUPPORT_ERRNO=0
  -sEXPORTED_FUNCTIONS=_malloc,_free)

find_program(GG_NODE NAMES node nodejs REQUIRED)
find_program(GG_ESBUILD esbuild REQUIRED)
find_program(GG_RSVG rsvg-convert REQUIRED)
file(GLOB_RECURSE page_sources CONFIGURE_DEPENDS ${CMAKE_SOURCE_DIR}/web/*)
set(page_stamp ${CMAKE_BINARY_DIR}/page.stamp)
add_custom_command(OUTPUT ${page_stamp} DEPENDS groundgrain ${page_sources} ${CMAKE_SOURCE_DIR}/assets/icon.svg
  COMMAND ${GG_NODE} ${CMAKE_SOURCE_DIR}/web/build.mjs --program ${CMAKE_BINARY_DIR} --out ${CMAKE_BINARY_DIR}/page
    --imgui ${GG_IMGUI}
  COMMAND ${CMAKE_COMMAND} -E touch ${page_stamp}
  VERBATIM)
add_custom_target(page ALL DEPENDS ${page_stamp})

# The three thin faces: the page (Emscripten) or the desktop window and command line.
if(EMSCRIPTEN)
  include(src/cmake/web.cmake)
else()
  include(src/cmake/desktop.cmake)
endif()

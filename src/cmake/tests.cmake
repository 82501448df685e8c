# One doctest program per room: test_wave, test_echo, ...; each runs natively under ctest, and as WebAssembly under node.
enable_testing()
add_library(gg_test_main OBJECT ${CMAKE_SOURCE_DIR}/tests/main.cpp)
target_link_libraries(gg_test_main PUBLIC gg_options)
if(EMSCRIPTEN)  # one script each, which reads the reference tables from the machine's own files
  target_link_options(gg_test_main PUBLIC -sENVIRONMENT=node -sNODERAWFS=1 -sSINGLE_FILE=1 -sALLOW_MEMORY_GROWTH=1
    -sEXIT_RUNTIME=1 -sTOTAL_STACK=1MB)
endif()
foreach(room wave echo survey draw paper ui app)
  file(GLOB sources CONFIGURE_DEPENDS ${CMAKE_SOURCE_DIR}/tests/${room}/*.cpp)
  if(NOT sources OR NOT TARGET gg_${room})
    continue()
  endif()
  add_executable(test_${room} ${sources})
  target_link_libraries(test_${room} PRIVATE gg_test_main gg_${room})
  target_include_directories(test_${room} PRIVATE ${CMAKE_SOURCE_DIR}/tests)
  # Light optimisation: the checks run in no time anyway, and build twice as fast.
  target_compile_options(test_${room} PRIVATE $<$<CONFIG:Release>:-O1>)
  target_compile_definitions(test_${room} PRIVATE GG_SOURCE_DIR="${CMAKE_SOURCE_DIR}")
  add_test(NAME ${room} COMMAND test_${room})
endforeach()
if(NOT EMSCRIPTEN AND TARGET groundgrain)
  add_test(NAME window COMMAND bash ${CMAKE_SOURCE_DIR}/tests/app/window_test.sh $<TARGET_FILE:groundgrain>)
endif()
# How long the answers take; prints, checks nothing.
add_executable(bench_native EXCLUDE_FROM_ALL ${CMAKE_SOURCE_DIR}/tests/bench/bench.cpp)
target_link_libraries(bench_native PRIVATE gg_paper)
add_executable(bench_section EXCLUDE_FROM_ALL ${CMAKE_SOURCE_DIR}/tests/bench/section.cpp)
target_link_libraries(bench_section PRIVATE gg_echo)
target_compile_definitions(bench_section PRIVATE GG_SOURCE_DIR="${CMAKE_SOURCE_DIR}")
if(EMSCRIPTEN)  # for tests/bench/section.mjs
  target_link_options(bench_section PRIVATE -sENVIRONMENT=web -sSINGLE_FILE=1 -sALLOW_MEMORY_GROWTH=1 -sEXIT_RUNTIME=1
    -sTOTAL_STACK=1MB)
endif()
if(TARGET gg_ui)
  add_executable(bench_frames EXCLUDE_FROM_ALL ${CMAKE_SOURCE_DIR}/tests/bench/frames.cpp)
  target_link_libraries(bench_frames PRIVATE gg_ui)
endif()

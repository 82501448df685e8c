# gg_embed(target symbol file): the file's bytes as  namespace gg::embedded { std::string_view <symbol>(); }
function(gg_embed target symbol file)
  get_filename_component(path ${file} ABSOLUTE BASE_DIR ${CMAKE_SOURCE_DIR})
  set(out ${CMAKE_BINARY_DIR}/embedded/${symbol}.cpp)
  add_custom_command(OUTPUT ${out} DEPENDS ${path} ${CMAKE_SOURCE_DIR}/src/cmake/embed_one.cmake
    COMMAND ${CMAKE_COMMAND} -DIN=${path} -DOUT=${out} -DSYMBOL=${symbol} -P ${CMAKE_SOURCE_DIR}/src/cmake/embed_one.cmake
    VERBATIM)
  target_sources(${target} PRIVATE ${out})
endfunction()

# gg_embed_all(target symbol files...): several files as  struct File { name, bytes };  std::span<const File> <symbol>();
function(gg_embed_all target symbol)
  set(paths)
  foreach(file IN LISTS ARGN)
    list(APPEND paths ${CMAKE_SOURCE_DIR}/${file})
  endforeach()
  set(out ${CMAKE_BINARY_DIR}/embedded/${symbol}.cpp)
  string(REPLACE ";" "|" joined "${paths}")
  add_custom_command(OUTPUT ${out} DEPENDS ${paths} ${CMAKE_SOURCE_DIR}/src/cmake/embed_one.cmake
    COMMAND ${CMAKE_COMMAND} "-DALL=${joined}" -DOUT=${out} -DSYMBOL=${symbol} -P ${CMAKE_SOURCE_DIR}/src/cmake/embed_one.cmake
    VERBATIM)
  target_sources(${target} PRIVATE ${out})
endfunction()

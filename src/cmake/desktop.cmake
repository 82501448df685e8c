# The desktop window and the command line: one program, `groundgrain`.
find_package(Threads REQUIRED)
add_library(gg_app STATIC ${CMAKE_SOURCE_DIR}/src/app/words.cpp ${CMAKE_SOURCE_DIR}/src/app/command_line.cpp
  ${CMAKE_SOURCE_DIR}/src/app/reckoner.cpp)
target_link_libraries(gg_app PUBLIC gg_paper Threads::Threads)
target_compile_definitions(gg_app PRIVATE GG_VERSION="${PROJECT_VERSION}")
if(NOT TARGET gg_ui)
  return()
endif()

find_package(OpenGL REQUIRED COMPONENTS OpenGL)
find_package(glfw3 3.3 REQUIRED)
set(app ${CMAKE_SOURCE_DIR}/src/app)
add_executable(groundgrain ${app}/main.cpp ${app}/platform_desktop.cpp ${app}/window_input.cpp ${app}/desktop_files.cpp)
target_link_libraries(groundgrain PRIVATE gg_app gg_ui gg_imgui_gl glfw OpenGL::OpenGL)

# Installing, and the Debian package of what is installed.
include(GNUInstallDirs)
configure_file(${CMAKE_SOURCE_DIR}/src/cmake/groundgrain.desktop.in ${CMAKE_BINARY_DIR}/groundgrain.desktop @ONLY)
install(TARGETS groundgrain RUNTIME DESTINATION ${CMAKE_INSTALL_BINDIR})
install(FILES ${CMAKE_BINARY_DIR}/groundgrain.desktop DESTINATION ${CMAKE_INSTALL_DATADIR}/applications)
install(FILES ${CMAKE_SOURCE_DIR}/assets/icon.svg DESTINATION ${CMAKE_INSTALL_DATADIR}/icons/hicolor/scalable/apps
  RENAME groundgrain.svg OPTIONAL)
install(FILES ${CMAKE_SOURCE_DIR}/README.md DESTINATION ${CMAKE_INSTALL_DOCDIR})
install(FILES ${demo_files} DESTINATION ${CMAKE_INSTALL_DOCDIR}/plans)

set(CPACK_GENERATOR DEB)
set(CPACK_PACKAGE_NAME groundgrain)
set(CPACK_PACKAGE_DESCRIPTION_SUMMARY "plans ground-penetrating-radar surveys by how fine a picture they will give")
set(CPACK_PACKAGE_CONTACT "Groundgrain <groundgrain@localhost>")
set(CPACK_PACKAGING_INSTALL_PREFIX /usr)
set(CPACK_DEBIAN_FILE_NAME DEB-DEFAULT)
set(CPACK_DEBIAN_PACKAGE_SECTION science)
set(CPACK_DEBIAN_PACKAGE_SHLIBDEPS ON)
set(CPACK_DEBIAN_PACKAGE_SUGGESTS "zenity | kdialog")
set(CPACK_STRIP_FILES ON)
include(CPack)

# Header-only libraries from Debian packages, linked into ${GG_HEADERS}: the cross compiler must never see /usr/include.
set(GG_HEADERS ${CMAKE_BINARY_DIR}/headers)
file(MAKE_DIRECTORY ${GG_HEADERS})
foreach(pair "nlohmann;/usr/include/nlohmann;nlohmann-json3-dev" "Eigen;/usr/include/eigen3/Eigen;libeigen3-dev"
        "unsupported;/usr/include/eigen3/unsupported;libeigen3-dev" "doctest;/usr/include/doctest;doctest-dev")
  list(GET pair 0 name)
  list(GET pair 1 folder)
  list(GET pair 2 package)
  if(NOT EXISTS ${folder})
    message(FATAL_ERROR "${folder} is missing: install the Debian package ${package}, or run tests/run.sh, which does")
  endif()
  file(CREATE_LINK ${folder} ${GG_HEADERS}/${name} SYMBOLIC)
endforeach()

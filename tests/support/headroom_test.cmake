# SPDX-License-Identifier: GPL-3.0-or-later
# headroom_test(<name> SOURCES a.cpp ... USES plant ... LINKS Qt6::Test ...)
# makes test_<name>, registered with ctest under the same name.
find_package(Catch2 REQUIRED)

function(headroom_test name)
  cmake_parse_arguments(TEST "" "TIMEOUT" "SOURCES;USES;LINKS;LABELS" ${ARGN})
  if(NOT TEST_TIMEOUT)
    set(TEST_TIMEOUT 120)
  endif()
  math(EXPR TEST_TIMEOUT "${TEST_TIMEOUT} * ${HEADROOM_TIMEOUT_FACTOR}")
  add_executable(test_${name} ${TEST_SOURCES})
  target_link_libraries(test_${name} PRIVATE headroom_options headroom_test_support ${TEST_LINKS})
  foreach(used IN LISTS TEST_USES)
    target_link_libraries(test_${name} PRIVATE headroom_${used})
  endforeach()
  # What a test measures is compiled on its own floor; the test's own words need no optimiser.
  # -Wrestrict raises false alarms over std::string in this compiler (GCC bug 105651).
  target_compile_options(test_${name} PRIVATE $<$<CONFIG:Release>:-O1>
    $<$<CXX_COMPILER_ID:GNU>:-Wno-restrict>)
  target_compile_definitions(test_${name} PRIVATE
    HEADROOM_SOURCE_DIR="${CMAKE_SOURCE_DIR}" HEADROOM_BUILD_DIR="${CMAKE_BINARY_DIR}")
  add_test(NAME ${name} COMMAND test_${name} --order rand --rng-seed time)
  set_tests_properties(${name} PROPERTIES TIMEOUT ${TEST_TIMEOUT} LABELS "${TEST_LABELS}")
endfunction()

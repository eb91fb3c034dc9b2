# SPDX-License-Identifier: GPL-3.0-or-later
# The floors of the house: every folder of the engine is one target with one door.
# ${build}/doors/<name>/<name> links to engine/<name>; that door is the only include path the
# target exports, so a header of a floor that was not asked for is simply not found.

add_library(headroom_options INTERFACE)
target_compile_options(headroom_options INTERFACE
  -Wall -Wextra -Wpedantic -Wconversion -Wshadow -Wdouble-promotion -Wnon-virtual-dtor
  -Woverloaded-virtual
  # The same bits on every machine: no contraction, no reordering; errno is not read.
  -ffp-contract=off -fno-math-errno)
if(HEADROOM_WERROR)
  target_compile_options(headroom_options INTERFACE -Werror)
endif()
if(CMAKE_BUILD_TYPE STREQUAL "Debug")
  target_compile_definitions(headroom_options INTERFACE _GLIBCXX_ASSERTIONS)
endif()
if(HEADROOM_SANITIZE)
  target_compile_options(headroom_options INTERFACE
    -fsanitize=${HEADROOM_SANITIZE} -fno-omit-frame-pointer -fno-sanitize-recover=all)
  target_link_options(headroom_options INTERFACE -fsanitize=${HEADROOM_SANITIZE})
endif()

# headroom_door(<target> <name> <folder>): the only include path of a folder.
function(headroom_door target name folder)
  set(door ${CMAKE_BINARY_DIR}/doors/${name})
  file(MAKE_DIRECTORY ${door})
  file(CREATE_LINK ${folder} ${door}/${name} SYMBOLIC)
  target_include_directories(${target} PUBLIC ${door})
endfunction()

# headroom_floor(<name> SOURCES a.cpp ... USES base units ... LINKS fmt::fmt ...)
# USES are other floors (their headers become visible), LINKS are libraries.
function(headroom_floor name)
  cmake_parse_arguments(FLOOR "" "" "SOURCES;USES;LINKS;PRIVATE_LINKS" ${ARGN})
  add_library(headroom_${name} STATIC ${FLOOR_SOURCES})
  headroom_door(headroom_${name} ${name} ${CMAKE_CURRENT_SOURCE_DIR})
  target_link_libraries(headroom_${name} PRIVATE headroom_options ${FLOOR_PRIVATE_LINKS})
  target_link_libraries(headroom_${name} PUBLIC ${FLOOR_LINKS})
  foreach(used IN LISTS FLOOR_USES)
    target_link_libraries(headroom_${name} PUBLIC headroom_${used})
  endforeach()
endfunction()

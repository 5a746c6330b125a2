# A room is one static library that links only what its arrow in DEVELOPERS.md allows, so that a call across a wall
# does not link; tools/check-rooms looks after headers, which a linker never sees.

add_library(slipledger_warnings INTERFACE)
target_compile_options(slipledger_warnings INTERFACE
  -Wall -Wextra -Wpedantic -Wshadow -Wconversion -Wold-style-cast -Wnon-virtual-dtor -Werror)

# slipledger_room(NAME SOURCES a.cpp ... LINKS room_x Boost::headers ...)
function(slipledger_room name)
  cmake_parse_arguments(ROOM "" "" "SOURCES;LINKS" ${ARGN})
  add_library(room_${name} STATIC ${ROOM_SOURCES})
  target_include_directories(room_${name} PUBLIC ${PROJECT_SOURCE_DIR})
  target_link_libraries(room_${name} PUBLIC ${ROOM_LINKS} PRIVATE slipledger_warnings)
endfunction()

# parses_times(a.cpp): for a source of this folder that reads times with date's parser, of whose header g++ 12 believes at -O2
# that it may read seconds it has not set: a false alarm.
function(parses_times source)
  set_source_files_properties(${source} PROPERTIES
    COMPILE_OPTIONS $<$<CXX_COMPILER_ID:GNU>:-Wno-maybe-uninitialized>)
endfunction()

# room_test(NAME SOURCES a_test.cpp ... LINKS room_x ...): one test program per room, each TEST a ctest test of its own.
function(room_test name)
  cmake_parse_arguments(ROOM "" "" "SOURCES;LINKS" ${ARGN})
  add_executable(${name}_test ${ROOM_SOURCES})
  target_include_directories(${name}_test PRIVATE ${PROJECT_SOURCE_DIR})
  target_link_libraries(${name}_test PRIVATE ${ROOM_LINKS} GTest::gmock GTest::gtest_main slipledger_warnings)
  target_compile_definitions(${name}_test PRIVATE SLIPLEDGER_SOURCE_DIR="${PROJECT_SOURCE_DIR}")
  # What is tested is built as it is installed; the tests themselves run once, and a third of their build was optimising them.
  target_compile_options(${name}_test PRIVATE $<$<CONFIG:Release>:-O0>)
  gtest_discover_tests(${name}_test TEST_PREFIX "${name}." DISCOVERY_TIMEOUT 60 PROPERTIES TIMEOUT 300)
endfunction()

# Turns text files into one C++ source, so that the executables carry their migrations, schemas and tables with them.
# Run at build time: cmake -DOUTPUT=x.cpp -DROOM=schema -DROOT=folder -DFILES=a.sql|b.json -P embed.cmake
# The source defines slipledger::ROOM::embedded_texts(), declared in ROOM/embedded.hpp, or in HEADER where that is given.
if(NOT HEADER)
  set(HEADER "${ROOM}/embedded.hpp")
endif()
string(REPLACE "|" ";" files "${FILES}")
list(LENGTH files count)
set(rows "")
foreach(file IN LISTS files)
  file(READ "${ROOT}/${file}" text)
  string(APPEND rows "    Text{\"${file}\", R\"EMBEDDED(${text})EMBEDDED\"},\n")
endforeach()
set(source "#include \"${HEADER}\"

#include <array>

namespace slipledger::${ROOM} {
namespace {

constexpr std::array<Text, ${count}> texts{{
${rows}}};

}  // namespace

std::span<const Text> embedded_texts() { return texts; }

}  // namespace slipledger::${ROOM}
")
file(WRITE "${OUTPUT}" "${source}")

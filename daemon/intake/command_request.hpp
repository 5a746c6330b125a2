// What the operator's command asks a running daemon, one JSON object a line, read and checked without any socket.
//   {"do":"load","feed":"...","file":"name","again":false}   with the open file passed along (SCM_RIGHTS)
//   {"do":"event","event":{"kind":"note","pump":"...","section":"...","at":"2026-03-01T06:00:00Z","by":"...","body":{}}}
//   {"do":"backup","file":"/absolute/path"}   {"do":"status"}   {"do":"drain"}
#pragma once

#include <string>
#include <string_view>

#include "daemon/intake/refusal.hpp"
#include "daemon/ledger/directory.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::intake {

struct CommandRequest {
    enum class Kind { load, event, backup, status, drain };

    Kind kind = Kind::status;
    std::string feed;  // of a load; empty: plain CSV or NDJSON
    std::string file;
    bool again = false;
    ledger::Event event;
};

Checked<CommandRequest> read_command(std::string_view line, const ledger::Directory& directory);

// The line that asks for it, with its line end.
std::string command_line(const CommandRequest& request);

}  // namespace slipledger::intake

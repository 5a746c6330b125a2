// What schema/plant.schema.json and the table of config/README.md must say, made from the key table of the reader.
#pragma once

#include <string>

namespace slipledger::config {

// JSON Schema, draft 2020-12.
std::string schema_of_keys();

// Markdown: a table per object.
std::string tables_of_keys();

}  // namespace slipledger::config

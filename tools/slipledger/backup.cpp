// `slipledger backup FILE`: a consistent copy of the ledger.
#include <fmt/format.h>

#include "tools/slipledger/command.hpp"
#include "tools/slipledger/desk.hpp"

namespace slipledger::command {

void add_backup(CLI::App& app, Shared& shared) {
    const auto file = std::make_shared<std::string>();
    CLI::App* command = add_command(app, shared, "backup", "a consistent copy of the ledger", false, [&shared, file] {
        const config::Plant plant = shared.plant();
        open_desk(plant)->backup(*file);
        fmt::print("{}: done\n", *file);
        return fine;
    });
    command->add_option("file", *file, "where the copy goes; must not exist")->required()->type_name("FILE");
}

}  // namespace slipledger::command

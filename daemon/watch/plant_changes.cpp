#include "daemon/watch/plant_changes.hpp"

#include <spdlog/spdlog.h>

#include <optional>

#include "daemon/ledger/lives.hpp"
#include "daemon/ledger/reader.hpp"

namespace slipledger::watch {

void store_plant_changes(const config::Plant& plant, ledger::Writer& writer, const Clock& clock) {
    const ledger::Reader reader(plant.store.path);
    for (const config::Pump& pump : plant.pumps) {
        const auto newest = reader.newest(writer.directory().pumps.at(pump.id));
        const std::optional<ledger::Event> change =
            ledger::plant_change(pump, reader.events(pump.id), newest, clock.now());
        if (!change) continue;
        writer.store(*change);
        if (newest) spdlog::info("pump {}: the plant file's facts changed; kept as a dated fact", pump.id);
    }
}

}  // namespace slipledger::watch

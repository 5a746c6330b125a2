#include "tests/config/patched_plant.hpp"

#include <nlohmann/json.hpp>

namespace slipledger::config {

std::string sound_plant() {
    return R"({
      "plant": "Test plant", "time_zone": "Europe/Berlin", "duty_h_per_week": 80,
      "fluids": {"site oil": {"points": [{"temperature_c": 40, "viscosity_cst": 44.1},
                                         {"temperature_c": 100, "viscosity_cst": 6.9}]}},
      "reservoirs": [{"id": "tank", "fluid": "HLP 46"}, {"id": "small-tank", "fluid": "site oil"}],
      "planned_stops": [{"from": "2026-08-03", "to": "2026-08-10", "areas": ["press hall"]}],
      "pumps": [
        {"id": "press-2", "area": "press hall", "reservoir": "tank", "type": "axial-piston",
         "control": "pressure-compensated", "displacement_cm3": 71, "compensator_bar": 250,
         "rated": {"pressure_bar": 280, "speed_rpm": 1480, "fluid_temperature_c": 50},
         "sensors": {"case_drain_flow": {"range": [0, 40], "accuracy": 0.05}}},
        {"id": "saw-1", "reservoir": "small-tank", "type": "vane", "displacement_cm3": 55,
         "rated": {"pressure_bar": 175, "speed_rpm": 1480, "fluid_temperature_c": 50},
         "sections": [{"id": "A"}, {"id": "B", "displacement_cm3": 28, "rated": {"pressure_bar": 140}}]}
      ],
      "feeds": [
        {"id": "hall", "kind": "tcp", "listen": "127.0.0.1:7310",
         "tags": {"HPU2.PT1": {"pump": "press-2", "quantity": "outlet_pressure", "unit": "psi"}}},
        {"id": "files", "kind": "drop", "folder": "in", "pump": "saw-1", "section": "B",
         "columns": {"P": {"quantity": "outlet_pressure"}}}
      ],
      "alerts": {"log": "alerts.ndjson", "webhooks": [{"name": "works", "url": "http://127.0.0.1:9/hook"}]}
    })";
}

PlantReading read_patched(const std::string& patch) {
    const auto plant = nlohmann::json::parse(sound_plant());
    return read_plant(plant.patch(nlohmann::json::parse(patch)).dump());
}

std::string told(const PlantReading& reading) {
    std::string text;
    for (const Fault& fault : reading.faults) text += format_fault(fault) + "\n";
    return text;
}

}  // namespace slipledger::config

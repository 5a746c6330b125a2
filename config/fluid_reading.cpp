#include "config/fluid_reading.hpp"

#include <algorithm>
#include <cassert>

#include "analytics/fluid.hpp"
#include "config/embedded.hpp"

namespace slipledger::config {
namespace {

FluidTable read_built_in_fluids() {
    FluidTable table;
    for (const Text& text : embedded_texts()) {
        const JsonReading reading = read_json(text.text);
        std::vector<Fault> faults = reading.faults;
        for (std::size_t i = 0; i < reading.root.keys.size(); ++i) {
            const std::string& name = reading.root.keys[i];
            const ObjectReader reader(reading.root.items[i], step_into("", name), "fluid", faults);
            table.emplace(name, read_fluid(name, reader));
        }
        assert(faults.empty() && "config/fluids.json is ours");
    }
    return table;
}

// Two points must be a liquid's: at different temperatures, thinner when hotter.
void check_points(const ObjectReader& reader, Fluid& fluid) {
    std::ranges::sort(fluid.points, {}, &ViscosityPoint::temperature_c);
    if (fluid.points.size() != 2) {
        reader.complain("points", "exactly two measured viscosities", "implausible");
        return;
    }
    const ViscosityPoint& cold = fluid.points[0];
    const ViscosityPoint& hot = fluid.points[1];
    if (!(hot.temperature_c >= cold.temperature_c + 5.0) || !(hot.viscosity_cst < cold.viscosity_cst))
        reader.complain("points", "two temperatures at least 5 degC apart, the oil thinner at the hotter",
                        "implausible");
}

}  // namespace

const FluidTable& built_in_fluids() {
    static const FluidTable table = read_built_in_fluids();
    return table;
}

Fluid read_fluid(const std::string& name, const ObjectReader& reader) {
    Fluid fluid;
    fluid.name = name;
    std::string source;
    reader.read("iso_vg", fluid.iso_vg);
    reader.read("viscosity_index", fluid.viscosity_index);
    reader.each("points", [&](const ObjectReader& point) {
        point.require({"temperature_c", "viscosity_cst"});
        point.read("temperature_c", fluid.points.emplace_back().temperature_c);
        point.read("viscosity_cst", fluid.points.back().viscosity_cst);
    });
    reader.read("density_15_kgm3", fluid.density_15_kgm3);
    reader.read("minimum_cst", fluid.minimum_cst);
    reader.read("maximum_cst", fluid.maximum_cst);
    reader.read("bulk_modulus_gpa", fluid.bulk_modulus_gpa);
    reader.read("source", source);
    const bool graded = reader.has("iso_vg") || reader.has("viscosity_index");
    if (reader.has("points") == graded) {
        reader.complain("either \"iso_vg\" with \"viscosity_index\", or two \"points\"", "implausible");
    } else if (graded) {
        reader.require({"iso_vg", "viscosity_index"});
        if (fluid.iso_vg && fluid.viscosity_index &&
            !analytics::Fluid::from_grade(*fluid.iso_vg, *fluid.viscosity_index))
            reader.complain("iso_vg", "an ISO 3448 grade: 10, 15, 22, 32, 46, 68, 100, 150, 220, ...", "out-of-range");
    } else {
        check_points(reader, fluid);
    }
    if (!(fluid.minimum_cst < fluid.maximum_cst))
        reader.complain(reader.has("minimum_cst") ? "minimum_cst" : "maximum_cst", "minimum_cst below maximum_cst",
                        "implausible");
    return fluid;
}

}  // namespace slipledger::config

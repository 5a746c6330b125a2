// A story through the real thing: readings into a ledger by the writer, judged by watch, read back as anybody would.
// Nothing is worked out here.
#pragma once

#include <filesystem>
#include <functional>
#include <span>

#include "config/plant.hpp"
#include "tools/judging/spoil.hpp"
#include "tools/judging/story.hpp"
#include "tools/judging/told.hpp"
#include "tools/plantsim/mill.hpp"

namespace slipledger::judging {

// Threads: a value, share freely.
struct PipelineResult {
    config::Plant plant;              // as the plant file was read
    std::vector<SectionTold> told{};  // as the story's sections
    std::uint64_t rows = 0;
};

// `see` is handed every row on its way, for the yardsticks. The ledger lies in `folder` and is gone afterwards. Throws
// where the plant file is not taken or the ledger fails: the bench's own fault.
PipelineResult run_pipeline(const Story& story, const plantsim::Mill& mill, Spoil spoil,
                            const std::filesystem::path& folder,
                            const std::function<void(std::span<const plantsim::Row>)>& see);

}  // namespace slipledger::judging

// Lives side by side, as text for a terminal and as JSON.
#pragma once

#include <nlohmann/json_fwd.hpp>
#include <string>
#include <vector>

#include "daemon/report/paragraph.hpp"
#include "daemon/report/past_lives.hpp"

namespace slipledger::report {

std::string lives_text(const std::vector<ModelLives>& models, const config::Plant& plant, const Paper& paper);

// {"models":[{"model","ended","median_hours","median_wear_per_1000_h","right","late","wrong","lives":[...]}]}
nlohmann::ordered_json to_json(const std::vector<ModelLives>& models);

}  // namespace slipledger::report

#include "daemon/intake/reply.hpp"

#include <nlohmann/json.hpp>

namespace slipledger::intake {
namespace {

std::string line_of(const nlohmann::ordered_json& value) {
    return value.dump(-1, ' ', false, nlohmann::ordered_json::error_handler_t::replace) + "\n";
}

}  // namespace

std::string reply_line(const LineAccount& account, std::uint64_t stored, std::uint64_t repeated) {
    nlohmann::ordered_json reply;
    reply["stored"] = stored;
    reply["repeated"] = repeated;
    reply["refused"] = account.refused;
    reply["through"] = account.through;
    reply["faults"] = nlohmann::ordered_json::array();
    for (const LineFault& fault : account.faults) reply["faults"].push_back({{"line", fault.line}, {"reason", fault.reason}});
    if (account.more_faults > 0) reply["more_faults"] = account.more_faults;
    return line_of(reply);
}

std::string failure_line(const std::string& failure) {
    nlohmann::ordered_json reply;
    reply["failed"] = failure;
    return line_of(reply);
}

}  // namespace slipledger::intake

#include "daemon/notify/cloud_event.hpp"

#include <boost/url/encode.hpp>
#include <boost/url/rfc/unreserved_chars.hpp>
#include <nlohmann/json.hpp>

#include "daemon/report/when.hpp"

namespace slipledger::notify {

std::string cloud_event(const std::string& plant, const ledger::Notice& notice) {
    nlohmann::ordered_json event{
        {"specversion", "1.0"},
        {"id", notice.id},
        {"source", "/slipledger/" + boost::urls::encode(plant, boost::urls::unreserved_chars)},
        {"type", "slipledger.notice." + notice.kind}};
    if (!notice.pump.empty()) event["subject"] = notice.section.empty() ? notice.pump : notice.pump + "/" + notice.section;
    event["time"] = report::rfc3339(notice.at);
    event["datacontenttype"] = "application/json";
    event["data"] = nlohmann::ordered_json::parse(notice.body, nullptr, false);
    return event.dump(-1, ' ', false, nlohmann::ordered_json::error_handler_t::replace);
}

}  // namespace slipledger::notify

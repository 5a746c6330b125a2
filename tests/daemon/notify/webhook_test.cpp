#include "daemon/notify/webhook.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <nlohmann/json.hpp>
#include <ostream>
#include <thread>
#include <vector>

#include "daemon/notify/cloud_event.hpp"

namespace slipledger::notify {
namespace {

// Answers as the test says, and keeps what was asked.
class CannedTransport final : public Transport {
public:
    void post(PostRequest request, std::function<void(PostOutcome)> done) override {
        requests.push_back(request);
        if (answers) done(answer);
        else kept = std::move(done);
    }

    std::vector<PostRequest> requests;
    std::function<void(PostOutcome)> kept;
    PostOutcome answer{200, "", true};
    bool answers = true;
};

ledger::Notice notice() {
    ledger::Notice made;
    made.id = "4f1c";
    made.pump = "press-2";
    made.section = "A";
    made.kind = "raised";
    made.at = analytics::Instant(std::chrono::seconds(1772366400));  // 2026-03-01T12:00:00Z (Python datetime)
    made.body = R"({"id":"4f1c","rule":"leakage-ratio"})";
    return made;
}

config::Webhook hook() {
    config::Webhook made;
    made.name = "cmms";
    made.url = "http://127.0.0.1:9/alerts";
    made.timeout = std::chrono::seconds(3);
    return made;
}

// Outside source: CloudEvents 1.0 core specification, required and optional attributes of structured mode (from memory).
TEST(Webhook, SendsACloudEventInStructuredMode) {
    CannedTransport transport;
    Webhook webhook(hook(), "Veneer Mill 1", transport);
    EXPECT_EQ(webhook.deliver(notice()).delivery, Delivery::delivered);
    ASSERT_EQ(transport.requests.size(), 1U);
    const PostRequest& request = transport.requests.front();
    EXPECT_EQ(request.content_type, "application/cloudevents+json");
    EXPECT_EQ(request.url, hook().url);
    EXPECT_EQ(request.timeout, std::chrono::seconds(3));
    const auto event = nlohmann::json::parse(request.body);
    EXPECT_EQ(event["specversion"], "1.0");
    EXPECT_EQ(event["id"], "4f1c");
    EXPECT_EQ(event["source"], "/slipledger/Veneer%20Mill%201");
    EXPECT_EQ(event["type"], "slipledger.notice.raised");
    EXPECT_EQ(event["subject"], "press-2/A");
    EXPECT_EQ(event["time"], "2026-03-01T12:00:00Z");
    EXPECT_EQ(event["datacontenttype"], "application/json");
    EXPECT_EQ(event["data"]["rule"], "leakage-ratio");
}

struct Answer {
    const char* name;
    PostOutcome outcome;
    Delivery delivery;

    friend std::ostream& operator<<(std::ostream& out, const Answer& answer) { return out << answer.name; }
};

class WebhookAnswer : public testing::TestWithParam<Answer> {};

TEST_P(WebhookAnswer, DecidesWhetherToTryAgain) {
    EXPECT_EQ(judge_answer(GetParam().outcome).delivery, GetParam().delivery);
}

INSTANTIATE_TEST_SUITE_P(
    Answers, WebhookAnswer,
    testing::Values(Answer{"Ok", {200, "", true}, Delivery::delivered},
                    Answer{"NoContent", {204, "", true}, Delivery::delivered},
                    Answer{"RedirectIsNotFollowed", {302, "", true}, Delivery::refused},
                    Answer{"BadRequest", {400, "", true}, Delivery::refused},
                    Answer{"Unauthorised", {401, "", true}, Delivery::refused},
                    Answer{"Forbidden", {403, "", true}, Delivery::refused},
                    Answer{"NotFound", {404, "", true}, Delivery::refused},
                    Answer{"Gone", {410, "", true}, Delivery::refused},
                    Answer{"TooLarge", {413, "", true}, Delivery::refused},
                    Answer{"Unprocessable", {422, "", true}, Delivery::refused},
                    Answer{"RequestTimeout", {408, "", true}, Delivery::try_again},
                    Answer{"TooMany", {429, "", true}, Delivery::try_again},
                    Answer{"ServerError", {500, "", true}, Delivery::try_again},
                    Answer{"Unavailable", {503, "", true}, Delivery::try_again},
                    Answer{"NoAnswer", {0, "cannot connect", true}, Delivery::try_again},
                    Answer{"NoUrl", {0, "not a URL", false}, Delivery::refused}),
    [](const auto& row) { return std::string(row.param.name); });

TEST(Webhook, AbandonsWhatIsUnderWayWhenStopping) {
    CannedTransport transport;
    transport.answers = false;
    Webhook webhook(hook(), "mill", transport);
    DeliveryOutcome outcome;
    std::thread outbox([&] { outcome = webhook.deliver(notice()); });
    std::this_thread::sleep_for(std::chrono::milliseconds(20));
    webhook.abandon();
    outbox.join();
    EXPECT_EQ(outcome.delivery, Delivery::abandoned);
    EXPECT_EQ(webhook.deliver(notice()).delivery, Delivery::abandoned);
    if (transport.kept) transport.kept({200, "", true});  // an answer that comes after all hurts nobody
}

}  // namespace
}  // namespace slipledger::notify

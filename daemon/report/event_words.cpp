#include "daemon/report/event_words.hpp"

#include <fmt/format.h>

#include <array>
#include <nlohmann/json.hpp>
#include <string_view>

#include "daemon/ledger/event_body.hpp"
#include "daemon/report/when.hpp"

namespace slipledger::report {
namespace {

using nlohmann::json;

// A particular of a body: `words` with {} for its value. Threads: immutable, share freely.
struct Particular {
    const char* key;
    std::string_view words;
};

constexpr std::array<Particular, 11> texts{{{"text", "{}"},
                                            {"note", "{}"},
                                            {"why", "{}"},
                                            {"model", "{}"},
                                            {"found", "found {}"},
                                            {"quantity", "{}"},
                                            {"particles", "particles {}"},
                                            {"believe", "believe {}"},
                                            {"of", "of {}"},
                                            {"rule", "{}"},
                                            {"reservoir", "in {}"}}};
constexpr std::array<Particular, 10> numbers{{{"displacement_cm3", "{:g} cm3"},
                                              {"bar", "{:g} bar"},
                                              {"flow_lpm", "{:g} L/min"},
                                              {"pressure_bar", "at {:g} bar"},
                                              {"speed_rpm", "{:g} rpm"},
                                              {"temperature_c", "{:g} degC"},
                                              {"viscosity_cst", "{:g} mm2/s"},
                                              {"viscosity_40_cst", "{:g} mm2/s at 40 degC"},
                                              {"viscosity_100_cst", "{:g} mm2/s at 100 degC"},
                                              {"water_ppm", "water {:g} ppm"}}};

// Threads: one at a time.
class Words {
public:
    void add(const std::string& part) {
        if (!part.empty()) line_ += (line_.empty() ? "" : ", ") + part;
    }
    void add_numbers(const json& body) {
        for (const Particular& particular : numbers)
            if (const auto value = ledger::number_in(body, particular.key))
                add(fmt::format(fmt::runtime(particular.words), *value));
    }
    void add_texts(const json& body) {
        for (const Particular& particular : texts)
            if (const std::string value = ledger::text_in(body, particular.key); !value.empty())
                add(fmt::format(fmt::runtime(particular.words), value));
    }
    std::string line() && { return std::move(line_); }

private:
    std::string line_;
};

std::string makers_test(const json& test) {
    Words words;
    if (const auto leakage = ledger::number_in(test, "leakage_lpm"))
        words.add(fmt::format("maker's test {:g} L/min", *leakage));
    words.add_numbers(test);
    return std::move(words).line();
}

}  // namespace

std::string event_words(const ledger::Event& event) {
    const json body = ledger::body_of(event);
    Words words;
    words.add(ledger::text_in(ledger::object_in(body, "fluid"), "name"));
    words.add_numbers(body);
    words.add_texts(body);
    words.add(makers_test(ledger::object_in(body, "maker_test")));
    if (const auto as_new = body.find("as_new"); as_new != body.end() && *as_new == true) words.add("as new");
    if (const auto to = ledger::number_in(body, "to_ms"))
        words.add("until " + rfc3339(analytics::Instant(analytics::Milliseconds(static_cast<std::int64_t>(*to)))));
    return std::move(words).line();
}

}  // namespace slipledger::report

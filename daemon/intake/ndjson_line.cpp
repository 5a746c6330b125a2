#include "daemon/intake/ndjson_line.hpp"

#include <charconv>
#include <optional>
#include <utility>

#include <nlohmann/json.hpp>

namespace slipledger::intake {
namespace {

using nlohmann::json;

// Fills `fields`; every callback returns false to stop.
class FlatObject final : public json::json_sax_t {
public:
    explicit FlatObject(std::vector<JsonField>& fields) : fields_(fields) {}

    std::size_t count() const { return count_; }
    std::optional<Refusal> refusal;

    bool start_object(std::size_t) override {
        if (!inside_) return inside_ = true;
        return refuse("an object inside the row", "plain values");
    }
    bool end_object() override { return true; }
    bool start_array(std::size_t) override { return refuse("a list", "one object with plain values"); }
    bool end_array() override { return true; }

    bool key(string_t& name) override {
        for (std::size_t i = 0; i < count_; ++i) {
            if (fields_[i].key != name) continue;
            refusal = Refusal(Reason::duplicate_key, in_quotes(name), "stands twice in the row", "each key once");
            return false;
        }
        if (count_ == NdjsonLine::most_keys) return refuse("more than 256 keys", "a row");
        if (count_ == fields_.size()) fields_.emplace_back();
        fields_[count_++].key.assign(name);
        return true;
    }

    bool null() override { return set(JsonField::Kind::nothing, 0.0, "null"); }
    bool boolean(bool value) override { return set(JsonField::Kind::truth, value ? 1.0 : 0.0, value ? "true" : "false"); }
    bool number_integer(number_integer_t value) override { return whole(value); }
    bool number_unsigned(number_unsigned_t value) override { return whole(value); }
    bool number_float(number_float_t value, const string_t& text) override {
        return set(JsonField::Kind::number, value, text);
    }
    bool string(string_t& text) override { return set(JsonField::Kind::text, 0.0, text); }
    bool binary(binary_t&) override { return refuse("binary data", "plain values"); }
    bool parse_error(std::size_t position, const std::string&, const nlohmann::detail::exception&) override {
        return refuse("not JSON at byte " + std::to_string(position), "one object a line, e.g. {\"time\":\"2026-03-01T06:00:00Z\", ...}");
    }

private:
    bool refuse(std::string found, std::string wanted) {
        if (!refusal) refusal = Refusal(Reason::bad_syntax, {}, std::move(found), std::move(wanted));
        return false;
    }
    template <class Whole>
    bool whole(Whole value) {
        char text[24];
        const auto end = std::to_chars(text, text + sizeof text, value).ptr;
        return set(JsonField::Kind::number, static_cast<double>(value), std::string_view(text, end));
    }
    bool set(JsonField::Kind kind, double number, std::string_view text) {
        if (!inside_) return refuse(in_quotes(text) + " alone", "one object a line");
        JsonField& field = fields_[count_ - 1];
        field.kind = kind;
        field.number = number;
        field.text.assign(text);
        return true;
    }

    std::vector<JsonField>& fields_;
    std::size_t count_ = 0;
    bool inside_ = false;
};

}  // namespace

Checked<std::span<const JsonField>> NdjsonLine::read(std::string_view line) {
    FlatObject object(fields_);
    if (!json::sax_parse(line.begin(), line.end(), &object) || object.refusal)
        return object.refusal.value_or(Refusal(Reason::bad_syntax, {}, "not JSON", "one object a line"));
    return std::span<const JsonField>(fields_.data(), object.count());
}

}  // namespace slipledger::intake

#include "daemon/intake/row_reader.hpp"

#include <cstdio>
#include <utility>

#include "daemon/intake/seven_digits.hpp"

namespace slipledger::intake {
namespace {

constexpr std::size_t most_told = 64;

std::string_view trimmed(std::string_view text) {
    while (text.starts_with(' ') || text.starts_with('\t')) text.remove_prefix(1);
    while (text.ends_with(' ') || text.ends_with('\t')) text.remove_suffix(1);
    return text;
}

std::string_view field_at(std::span<const std::string_view> fields, const std::optional<std::size_t>& position) {
    return position ? trimmed(fields[*position]) : std::string_view();
}

Refusal bad_number(const Measure& measure, std::string found) {
    const auto& facts = analytics::facts_of(measure.quantity);
    std::string wanted = measure.unit;
    if (measure.unit == facts.unit) wanted += ", e.g. " + std::string(facts.example);
    return Refusal(Reason::bad_number, measure.name, std::move(found), std::move(wanted));
}

std::string shown(double value) {
    char text[32];
    const int length = std::snprintf(text, sizeof text, "%.7g", value);
    return std::string(text, static_cast<std::size_t>(length));
}

Refusal out_of_range(const Measure& measure, std::string_view text, const ValueRange& range) {
    return Refusal(Reason::out_of_range, measure.name, in_quotes(text) + " cannot be",
                   shown(range.low) + " to " + shown(range.high) + " " +
                       std::string(analytics::facts_of(measure.quantity).unit));
}

}  // namespace

RowReader::RowReader(const Mapping& mapping, ReadOptions options)
    : mapping_(mapping),
      feed_(mapping.feed()),
      options_(std::move(options)),
      times_(feed_.time),
      csv_(feed_.delimiter),
      batch_(mapping.feed_id(), options_.place, options_.most_rows) {}

void RowReader::read(std::string_view& bytes, ledger::Instant now) {
    while (!hopeless_ && !batch_.full()) {
        const auto line = lines_.next(bytes);
        if (!line) return;
        read_line(*line, now);
    }
}

void RowReader::finish(ledger::Instant now) {
    if (hopeless_) return;
    const auto line = lines_.rest();
    if (!line) return;
    if (options_.unfinished_counts) return read_line(*line, now);
    batch_.line(line->number, line->text, now);
    batch_.refuse_unfinished(
        Refusal(Reason::unfinished_line, {}, "the connection ended inside the line", "a line end after each row"));
}

void RowReader::read_line(const Line& line, ledger::Instant now) {
    now_ = now;
    row_lost_ = false;
    batch_.line(line.number, line.text, now);
    if (line.too_long)
        return batch_.refuse_row(Refusal(Reason::line_too_long, {}, "longer than 64 KiB", "one row a line"));
    if (trimmed(line.text).empty()) return;
    if (feed_.format == config::FeedFormat::ndjson) read_json(line.text);
    else read_csv(line.text);
}

void RowReader::read_csv(std::string_view line) {
    if (!columns_ && !feed_.header) {
        const std::vector<std::string_view> names(feed_.header_names.begin(), feed_.header_names.end());
        read_header(names);
        if (hopeless_) return;
    }
    if (line == header_text_) return;  // files laid end to end
    const auto fields = csv_.split(line);
    if (!columns_) {
        if (!fields) return give_up(fields.error());
        header_text_ = line;
        return read_header(*fields);
    }
    if (!fields) return batch_.refuse_row(fields.error());
    if (fields->size() != columns_->count)
        return batch_.refuse_row(Refusal(Reason::wrong_field_count, {}, std::to_string(fields->size()) + " fields",
                                         std::to_string(columns_->count) + " as in the header"));
    if (feed_.layout == config::CsvLayout::tall) read_tall(*fields);
    else read_wide(*fields);
}

void RowReader::read_header(std::span<const std::string_view> names) {
    columns_ = Columns{};
    columns_->count = names.size();
    std::set<std::string_view> seen;
    for (std::size_t i = 0; i < names.size(); ++i) {
        const std::string_view name = trimmed(names[i]);
        if (!name.empty() && !seen.insert(name).second)
            return give_up(Refusal(Reason::bad_header, in_quotes(name), "stands twice in the header", "each column once"));
        read_header_name(name, i);
    }
    if (auto fault = fault_of_columns()) give_up(std::move(*fault));
}

void RowReader::read_header_name(std::string_view name, std::size_t position) {
    const bool tall = feed_.layout == config::CsvLayout::tall;
    if (name == feed_.time.column) columns_->time = position;
    else if (name == feed_.pump_column) columns_->pump = position;
    else if (name == feed_.section_column) columns_->section = position;
    else if (tall && name == feed_.tag_column) columns_->tag = position;
    else if (tall && name == feed_.value_column) columns_->value = position;
    else if (const Measure* measure = tall ? nullptr : mapping_.column(name))
        columns_->measures.emplace_back(position, measure);
    else batch_.remark(mapping_.unknown_column(name));
}

std::optional<Refusal> RowReader::fault_of_columns() const {
    const auto missing = [](std::string column) {
        return Refusal(Reason::bad_header, {}, "the header has no column " + in_quotes(column), "a header as the feed's entry says");
    };
    if (!columns_->time) return missing(feed_.time.column);
    if (feed_.layout == config::CsvLayout::tall) {
        if (!columns_->tag) return missing(feed_.tag_column);
        if (!columns_->value) return missing(feed_.value_column);
        return std::nullopt;
    }
    if (columns_->measures.empty()) return missing("outlet_pressure, or of any other quantity,");
    bool needs_pump = false;
    for (const auto& [position, measure] : columns_->measures) needs_pump = needs_pump || measure->place == nullptr;
    if (needs_pump && !columns_->pump && mapping_.fixed_pump() == nullptr) return missing(feed_.pump_column);
    return std::nullopt;
}

void RowReader::give_up(Refusal refusal) {
    refusal.reason = Reason::bad_header;
    batch_.refuse_row(refusal);
    hopeless_ = true;
}

void RowReader::read_wide(std::span<const std::string_view> fields) {
    if (!open(fields[*columns_->time], {field_at(fields, columns_->pump), field_at(fields, columns_->section)})) return;
    for (const auto& [position, measure] : columns_->measures)
        if (!fields[position].empty()) add_text(*measure, fields[position]);
    if (!row_lost_) batch_.close_row();
}

void RowReader::read_tall(std::span<const std::string_view> fields) {
    const std::string_view tag = field_at(fields, columns_->tag);
    const Measure* measure = mapping_.tag(tag);
    if (tag.empty()) return batch_.refuse_row(Refusal(Reason::missing_tag, feed_.tag_column, "is empty", "a tag"));
    if (measure == nullptr) return batch_.refuse_row(mapping_.unknown_tag(tag));
    if (!open(fields[*columns_->time], {field_at(fields, columns_->pump), field_at(fields, columns_->section)})) return;
    if (!fields[*columns_->value].empty()) add_text(*measure, fields[*columns_->value]);
    if (!row_lost_) batch_.close_row();
}

void RowReader::read_json(std::string_view line) {
    const auto fields = ndjson_.read(line);
    if (!fields) return batch_.refuse_row(fields.error());
    const auto find = [&](const std::string& key) -> const JsonField* {
        for (const JsonField& field : *fields)
            if (field.key == key) return &field;
        return nullptr;
    };
    const auto name_in = [](const JsonField* field) { return field == nullptr ? std::string_view() : std::string_view(field->text); };
    const JsonField* tag = find(feed_.tag_column);
    if (tag != nullptr && mapping_.tag(tag->text) == nullptr) return batch_.refuse_row(mapping_.unknown_tag(tag->text));
    const JsonField* time = find(feed_.time.column);
    if (time == nullptr)
        return batch_.refuse_row(Refusal(Reason::missing_time, {}, "no key " + in_quotes(feed_.time.column), "the row's time"));
    if (!open(time->text, {name_in(find(feed_.pump_column)), name_in(find(feed_.section_column))})) return;
    if (tag != nullptr) read_json_tagged(*tag, find(feed_.value_column));
    else read_json_wide(*fields);
    if (!row_lost_) batch_.close_row();
}

void RowReader::read_json_wide(std::span<const JsonField> fields) {
    for (const JsonField& field : fields) {
        if (field.key == feed_.time.column || field.key == feed_.pump_column || field.key == feed_.section_column) continue;
        if (const Measure* measure = mapping_.column(field.key)) add_json(*measure, field);
        else if (told_.size() < most_told && told_.insert(field.key).second) batch_.remark(mapping_.unknown_column(field.key));
    }
}

void RowReader::read_json_tagged(const JsonField& tag, const JsonField* value) {
    if (value != nullptr) add_json(*mapping_.tag(tag.text), *value);
}

bool RowReader::open(std::string_view time_text, const Names& names) {
    const auto time = times_.read(time_text);
    if (!time) {
        Refusal refusal = time.error();
        refusal.where = feed_.time.column;
        batch_.refuse_row(refusal);
        return false;
    }
    if (*time > now_ + feed_.max_ahead) {
        batch_.refuse_row(Refusal(Reason::future, feed_.time.column, in_quotes(time_text) + " is ahead of the receiving clock",
                                  "at most " + std::to_string(feed_.max_ahead.count()) + " s ahead"));
        return false;
    }
    if (!resolve(names)) return false;
    batch_.open_row(*time);
    return true;
}

bool RowReader::resolve(const Names& names) {
    const std::string_view name = names.pump.empty() ? std::string_view(feed_.pump) : names.pump;
    const std::string_view section = names.section.empty() && names.pump.empty() ? std::string_view(feed_.section) : names.section;
    if (place_ != nullptr && name == pump_name_ && section == section_name_) return true;
    place_ = nullptr;
    pump_ = nullptr;
    if (name.empty()) return true;
    pump_ = mapping_.pump(name);
    if (pump_ == nullptr) {
        batch_.refuse_row(mapping_.unknown_pump(name));
        return false;
    }
    const auto place = mapping_.place(*pump_, name, section);
    if (!place) {
        batch_.refuse_row(place.error());
        return false;
    }
    place_ = *place;
    pump_name_ = name;
    section_name_ = section;
    return true;
}

void RowReader::add_text(const Measure& measure, std::string_view text) {
    if (const auto number = read_number(text, feed_.decimal)) return add(measure, *number, text);
    if (measure.quantity == analytics::Quantity::running && (text == "true" || text == "false"))
        return add(measure, WrittenNumber{text == "true" ? 1.0 : 0.0, true}, text);
    if (!trimmed(text).empty()) batch_.refuse_cell(bad_number(measure, in_quotes(text) + " is not a number"));
}

void RowReader::add_json(const Measure& measure, const JsonField& field) {
    switch (field.kind) {
        case JsonField::Kind::nothing:
            return;
        case JsonField::Kind::number:
            return add(measure, WrittenNumber{field.number, false}, field.text);
        case JsonField::Kind::truth:
            if (measure.quantity == analytics::Quantity::running)
                return add(measure, WrittenNumber{field.number, true}, field.text);
            break;
        case JsonField::Kind::text:
            break;
    }
    batch_.refuse_cell(bad_number(measure, in_quotes(field.text) + " is not a JSON number"));
}

void RowReader::add(const Measure& measure, const WrittenNumber& number, std::string_view text) {
    if (row_lost_) return;
    const Place* place = measure.place != nullptr ? measure.place : place_;
    if (place == nullptr) {
        row_lost_ = true;
        return batch_.refuse_row(Refusal(Reason::missing_pump, {}, "the row names no pump", "key or column " + in_quotes(feed_.pump_column)));
    }
    if (measure.place == nullptr && is_of_pump(measure.quantity)) {
        place = pump_->pump;
    } else if (measure.place == nullptr && !measure.section.empty()) {
        const auto of_section = mapping_.place(*pump_, pump_name_, measure.section);
        if (!of_section) return batch_.refuse_cell(of_section.error());
        place = *of_section;
    }
    double value = number.value;
    if (measure.converts()) value = value * measure.factor + measure.offset;
    if (measure.converts() || !number.short_enough) value = seven_digits(value);
    const ValueRange& range = place->ranges[analytics::index_of(measure.quantity)];
    if (!(value >= range.low && value <= range.high)) return batch_.refuse_cell(out_of_range(measure, text, range));
    batch_.add(place->point, measure.quantity, value);
}

}  // namespace slipledger::intake

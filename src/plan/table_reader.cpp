#include "plan/table_reader.h"

#include <fmt/format.h>
#include <algorithm>
#include <cmath>

#include "plan/input_path.h"
#include "plan/month_day.h"
#include "plan/toml_text.h"
#include "plan/words.h"

namespace sunfall {
namespace {

constexpr std::array<const char*, 12> kMonthNames = {"January",   "February", "March",    "April",
                                                     "May",       "June",     "July",     "August",
                                                     "September", "October",  "November", "December"};
constexpr std::size_t kLongestText = 200;  // bytes; names and fields, never prose

std::string with_unit(const std::string& value, const std::string& unit) {
  return unit.empty() ? value : value + " " + unit;
}

// The library's own conversion refuses whole numbers that a double cannot hold exactly.
std::optional<double> number_in(const toml::node& node) {
  if (const auto* whole = node.as_integer()) return static_cast<double>(whole->get());
  if (const auto* real = node.as_floating_point()) return real->get();
  return std::nullopt;
}

bool reads_as_number(const toml::node& node) {
  const auto* text = node.as_string();
  if (text == nullptr || text->get().empty()) return false;
  return text->get().find_first_not_of("+-.0123456789eE") == std::string::npos;
}

}  // namespace

TableReader::TableReader(Reading& reading, TableShape shape, const toml::table* table, long line)
    : reading_(reading), shape_(std::move(shape)), table_(table), line_(line) {
  if (table_ != nullptr && shape_.named.empty()) refuse_unknown_keys();
}

void TableReader::refuse_unknown_keys() const {
  for (const toml::key& key : keys_in_order(*table_)) {
    const std::string name(key.str());
    if (shape_.has(name)) continue;
    if (const auto later = shape_.later.find(name); later != shape_.later.end()) {
      refuse(name, "this version does not know the key yet", "", later->second);
    }
    const auto home = reading_.homes.find(name);
    const bool elsewhere = home != reading_.homes.end();
    refuse(name, "unknown key", "",
           elsewhere ? "It belongs in [" + home->second + "]" : did_you_mean(name, shape_.key_names()));
  }
}

bool TableReader::has(const std::string& key) const { return table_ != nullptr && table_->contains(key); }

std::string TableReader::where(const std::string& key) const {
  long line = line_;
  if (has(key)) line = line_of(table_->find(key)->first);
  return reading_.file.where(line, joined_key(shape_.name, key));
}

void TableReader::refuse(const std::string& key, const std::string& what, const std::string& found,
                         const std::string& remedy) const {
  throw Error(ErrorKind::plan, {what, where(key), found, remedy});
}

void TableReader::refuse_at(long line, const std::string& key, Error::Parts parts) const {
  parts.where = reading_.file.where(line, joined_key(shape_.name, key));
  throw Error(ErrorKind::plan, std::move(parts));
}

void TableReader::refuse_type(const std::string& key, const std::string& needed,
                              const toml::node& node) const {
  refuse(key, "must be " + needed, described(node), "");
}

void TableReader::note_default(const std::string& key, const std::string& words) {
  reading_.defaults.push_back(shape_.name + "." + key + " = " + words);
}

const toml::node* TableReader::take(const std::string& key) {
  if (!shape_.has(key)) {
    throw Error(ErrorKind::internal, {"a key is read that its table does not declare", where(key), "", ""});
  }
  taken_.insert(key);
  return table_ == nullptr ? nullptr : table_->get(key);
}

const toml::node& TableReader::required(const std::string& key) {
  const toml::node* node = take(key);
  if (node == nullptr) {
    const auto note = std::find_if(shape_.keys.begin(), shape_.keys.end(),
                                   [&](const KeyNote& candidate) { return candidate.name == key; });
    refuse(key, "missing; " + reading_.file.called + " must give it", "",
           fmt::format("Add it to [{}] (type: {})", shape_.name, note->type));
  }
  return *node;
}

double TableReader::number_within(const std::string& key, const std::string& subject, const Bounds& bounds,
                                  const toml::node& node) const {
  const long line = line_of(node);  // of the one number, which a long list may hold lines below its key
  const std::optional<double> value = number_in(node);
  if (!value) {
    const std::string needed = bounds.unit.empty() ? "a number" : "a number, in " + bounds.unit;
    refuse_at(line, key,
              {subject + "must be " + needed, "", described(node),
               reads_as_number(node) ? "Write it without quotes" : ""});
  }
  if (!std::isfinite(*value)) {
    refuse_at(line, key, {subject + "must be a finite number", "", plain(*value), bounds.remedy});
  }
  if (*value < bounds.least || *value > bounds.most) {
    const std::string limits = plain(bounds.least) + " and " + with_unit(plain(bounds.most), bounds.unit);
    refuse_at(line, key, {subject + "must lie between " + limits, "", plain(*value), bounds.remedy});
  }
  return *value;
}

double TableReader::number(const NumberKey& key) {
  const toml::node* node = take(key.name);
  if (node != nullptr) return number_within(key.name, "", key.bounds, *node);
  if (key.required) required(key.name);
  note_default(key.name, with_unit(plain(key.fallback), key.bounds.unit));
  return key.fallback;
}

std::optional<double> TableReader::number_if_given(const NumberKey& key) {
  const toml::node* node = take(key.name);
  if (node == nullptr) return std::nullopt;
  return number_within(key.name, "", key.bounds, *node);
}

std::optional<double> TableReader::number_in_place_of_text(const NumberOrTextKey& key,
                                                           const toml::node& node) const {
  const bool is_field = key.text == NumberOrTextKey::Text::field;
  if (!node.is_string()) {
    if (number_in(node)) return number_within(key.name, "", key.bounds, node);
    refuse_type(key.name,
                is_field ? "a number, or the name of a field in quotes"
                         : "a number, or the path of a raster in quotes",
                node);
  }
  if (reads_as_number(node)) {
    refuse(key.name, is_field ? "must be a number or a field's name" : "must be a number or a raster's path",
           described(node), "Write the number without quotes");
  }
  return std::nullopt;
}

std::optional<NumberOrFile> TableReader::number_or_file(const NumberOrTextKey& key) {
  const toml::node* node = take(key.name);
  if (node == nullptr) {
    if (!key.fallback) return std::nullopt;
    note_default(key.name, with_unit(plain(*key.fallback), key.bounds.unit));
    return NumberOrFile{*key.fallback, std::nullopt};
  }
  if (const auto value = number_in_place_of_text(key, *node)) return NumberOrFile{*value, std::nullopt};
  return NumberOrFile{0.0, input_path(reading_.file, node->as_string()->get(), where(key.name))};
}

std::optional<NumberOrField> TableReader::number_or_field(const NumberOrTextKey& key) {
  const toml::node* node = take(key.name);
  if (node == nullptr) {
    if (!key.fallback) return std::nullopt;
    note_default(key.name, with_unit(plain(*key.fallback), key.bounds.unit));
    return NumberOrField{*key.fallback, ""};
  }
  if (const auto value = number_in_place_of_text(key, *node)) return NumberOrField{*value, ""};
  return NumberOrField{0.0, text_of(key.name, *node)};
}

int TableReader::whole(const WholeKey& key) {
  const toml::node* node = take(key.name);
  if (node == nullptr) {
    note_default(key.name, with_unit(plain(key.fallback), key.bounds.unit));
    return key.fallback;
  }
  if (!node->is_integer()) refuse_type(key.name, "a whole number", *node);
  return static_cast<int>(number_within(key.name, "", key.bounds, *node));
}

std::optional<std::array<double, 12>> TableReader::months_if_given(const MonthsKey& key) {
  const toml::node* node = take(key.name);
  if (node == nullptr) return std::nullopt;
  std::array<double, 12> values{};
  const toml::array* list = node->as_array();
  if (list == nullptr) {
    if (!key.one_will_do) refuse_type(key.name, "a list of twelve numbers, January to December", *node);
    values.fill(number_within(key.name, "", key.bounds, *node));
    return values;
  }
  if (list->size() != values.size()) {
    refuse(key.name, "needs twelve numbers, January to December", fmt::format("{} numbers", list->size()),
           key.one_will_do ? "One number alone, without [ ], stands for every month" : "");
  }
  for (std::size_t i = 0; i < values.size(); ++i) {
    const std::string subject = std::string("the value for ") + kMonthNames.at(i) + " ";
    values.at(i) = number_within(key.name, subject, key.bounds, *list->get(i));
  }
  return values;
}

std::optional<bool> TableReader::flag_if_given(const FlagKey& key) {
  const toml::node* node = take(key.name);
  if (node == nullptr) return std::nullopt;
  if (!node->is_boolean()) refuse_type(key.name, "true or false", *node);
  return node->as_boolean()->get();
}

bool TableReader::flag(const FlagKey& key) {
  if (const std::optional<bool> value = flag_if_given(key)) return *value;
  const bool fallback = key.fallback.value();
  note_default(key.name, fallback ? "true" : "false");
  return fallback;
}

std::string TableReader::text_of(const std::string& key, const toml::node& node) const {
  if (!node.is_string()) refuse_type(key, "a text in quotes", node);
  const std::string& text = node.as_string()->get();
  if (text.empty()) refuse(key, "the text is empty", "", "Write something, or remove the key");
  if (text.size() > kLongestText) {
    refuse(key, fmt::format("the text is longer than {} bytes", kLongestText), in_quotes(text), "Shorten it");
  }
  if (harmless(text, text.size()) != text) {
    refuse(key, "the text holds a control character", in_quotes(text), "Remove it");
  }
  return text;
}

std::string TableReader::text(const TextKey& key) {
  if (!key.fallback) return text_of(key.name, required(key.name));
  const toml::node* node = take(key.name);
  if (node != nullptr) return text_of(key.name, *node);
  note_default(key.name, in_quotes(*key.fallback));
  return *key.fallback;
}

std::optional<std::string> TableReader::optional_text(const TextKey& key) {
  const toml::node* node = take(key.name);
  if (node != nullptr) return text_of(key.name, *node);
  note_default(key.name, key.absent);
  return std::nullopt;
}

std::filesystem::path TableReader::path(const PathKey& key) {
  const toml::node& node = required(key.name);
  if (!node.is_string()) refuse_type(key.name, "a path in quotes", node);
  return input_path(reading_.file, node.as_string()->get(), where(key.name));
}

std::optional<std::filesystem::path> TableReader::optional_path(const PathKey& key) {
  if (has(key.name)) return path(key);
  take(key.name);
  note_default(key.name, key.absent);
  return std::nullopt;
}

std::chrono::month_day TableReader::day(const DayKey& key) {
  const toml::node& node = required(key.name);
  const std::string remedy = "Write month and day in quotes, such as \"04-15\"";
  if (!node.is_string()) refuse(key.name, "must be a day", described(node), remedy);
  const std::string& text = node.as_string()->get();
  const std::optional<std::chrono::month_day> day = month_day_of(text);
  if (!day) refuse(key.name, "no such day", in_quotes(text), remedy);
  return *day;
}

std::optional<std::size_t> TableReader::position(const std::string& key,
                                                 const std::vector<std::string>& names) {
  const toml::node* node = take(key);
  if (node == nullptr) return std::nullopt;
  std::vector<std::string> shown;
  for (const std::string& name : names) shown.push_back(in_quotes(name));
  if (!node->is_string()) refuse_type(key, listed(shown), *node);
  const std::string& text = node->as_string()->get();
  for (std::size_t i = 0; i < names.size(); ++i) {
    if (names[i] == text) return i;
  }
  refuse(key, "must be " + listed(shown), in_quotes(text), did_you_mean(text, names));
}

std::optional<TableReader> TableReader::table_if_given(const TableKey& key, const TableShape& shape) {
  const toml::node* node = take(key.name);
  if (node == nullptr) return std::nullopt;
  if (!node->is_table()) refuse_type(key.name, "a table, { key = value, … }", *node);
  return TableReader(reading_, shape, node->as_table(), line_of(table_->find(key.name)->first));
}

std::vector<std::string> TableReader::own_names() const {
  std::vector<std::string> names;
  if (table_ == nullptr) return names;
  for (const toml::key& key : keys_in_order(*table_)) {
    if (!shape_.has(std::string(key.str()))) names.emplace_back(key.str());
  }
  return names;
}

TableReader TableReader::own_table(const std::string& name, const std::string& needed) {
  const toml::node& node = *table_->get(name);
  if (!node.is_table()) {
    refuse(name, "neither a key of [" + shape_.name + "] nor " + needed, described(node),
           did_you_mean(name, shape_.key_names()));
  }
  TableShape shape = shape_.named.front();
  shape.name = joined_key(shape_.name, name);
  return {reading_, std::move(shape), node.as_table(), line_of(table_->find(name)->first)};
}

void TableReader::finish() const {
  for (const KeyNote& note : shape_.keys) {
    if (has(note.name) && !taken_.contains(note.name)) {
      throw Error(ErrorKind::internal, {"a declared key is not read", where(note.name), "", ""});
    }
  }
}

}  // namespace sunfall

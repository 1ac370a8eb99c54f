#pragma once
// One table of a plan, read key by key. Every value comes out typed and checked; every fault names
// file, line and key. Keys that the table's shape lacks are refused before anything is read, and
// the reader notes which keys were taken, so that no key is accepted and then ignored.

#include <toml++/toml.h>
#include <array>
#include <chrono>
#include <filesystem>
#include <map>
#include <optional>
#include <set>
#include <string>
#include <vector>

#include "plan/key_shapes.h"
#include "plan/plan_file.h"
#include "plan/words.h"
#include "sunfall/error.h"
#include "sunfall/plan.h"

namespace sunfall {

// What all tables of one plan share while it is read.
struct Reading {
  PlanFile file;
  std::map<std::string, std::string> homes;  // each known key and the table that it belongs in
  std::vector<std::string> defaults;         // what the plan left open, in words
};

class TableReader {
 public:
  // `table` is null where the plan lacks the table; then every key is absent. `line` is where the
  // table begins, 0 without one. `reading` and `table` must outlive the reader.
  TableReader(Reading& reading, TableShape shape, const toml::table* table, long line);

  bool given() const { return table_ != nullptr; }
  bool has(const std::string& key) const;
  // Where a key stands; for an absent one, where its table begins.
  std::string where(const std::string& key) const;

  double number(const NumberKey& key);
  // Nothing where the key is absent and has no fallback. A file must exist; a field's name is a text.
  std::optional<NumberOrFile> number_or_file(const NumberOrTextKey& key);
  std::optional<NumberOrField> number_or_field(const NumberOrTextKey& key);
  std::optional<double> number_if_given(const NumberKey& key);
  int whole(const WholeKey& key);
  bool flag(const FlagKey& key);
  std::string text(const TextKey& key);
  std::filesystem::path path(const PathKey& key);
  std::chrono::month_day day(const DayKey& key);
  template <typename Enum>
  Enum choice(const ChoiceKey<Enum>& key);

  // Nothing where the key is absent; the first two then note what that means.
  std::optional<std::string> optional_text(const TextKey& key);
  std::optional<std::filesystem::path> optional_path(const PathKey& key);
  std::optional<bool> flag_if_given(const FlagKey& key);
  std::optional<std::array<double, 12>> months_if_given(const MonthsKey& key);
  // `shape` carries the inner table's whole name, "light.series".
  std::optional<TableReader> table_if_given(const TableKey& key, const TableShape& shape);

  // The user's own names in the table, in the plan's order, and the table that each holds.
  std::vector<std::string> own_names() const;
  TableReader own_table(const std::string& name, const std::string& needed);

  // "site.receiver_height = 0.5 m" among the defaults.
  void note_default(const std::string& key, const std::string& words);
  [[noreturn]] void refuse(const std::string& key, const std::string& what, const std::string& found,
                           const std::string& remedy) const;
  // After the last key: a key that the shape has and nobody took is a fault of ours.
  void finish() const;

 private:
  void refuse_unknown_keys() const;
  const toml::node* take(const std::string& key);
  const toml::node& required(const std::string& key);
  [[noreturn]] void refuse_at(long line, const std::string& key, Error::Parts parts) const;
  [[noreturn]] void refuse_type(const std::string& key, const std::string& needed,
                                const toml::node& node) const;
  // The number of a key that may hold a text; nothing where it holds one. The node must not be null.
  std::optional<double> number_in_place_of_text(const NumberOrTextKey& key, const toml::node& node) const;
  double number_within(const std::string& key, const std::string& subject, const Bounds& bounds,
                       const toml::node& node) const;
  std::string text_of(const std::string& key, const toml::node& node) const;
  // The position in `names` of the text that the key holds, or nothing where it is absent.
  std::optional<std::size_t> position(const std::string& key, const std::vector<std::string>& names);

  Reading& reading_;
  TableShape shape_;
  const toml::table* table_;
  long line_;
  std::set<std::string> taken_;
};

template <typename Enum>
Enum TableReader::choice(const ChoiceKey<Enum>& key) {
  const std::optional<std::size_t> at = position(key.name, key.names());
  if (at) return key.choices[*at].second;
  if (key.required) required(key.name);
  note_default(key.name, in_quotes(key.name_of(key.fallback)));
  return key.fallback;
}

}  // namespace sunfall

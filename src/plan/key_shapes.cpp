#include "plan/key_shapes.h"

#include <algorithm>

#include "plan/words.h"

namespace sunfall {
namespace {

constexpr const char* kRequired = "required";

std::string or_required(const std::string& absent) { return absent.empty() ? kRequired : absent; }

std::vector<std::string> all_quoted(const std::vector<std::string>& names) {
  std::vector<std::string> shown;
  for (const std::string& name : names) shown.push_back(in_quotes(name));
  return shown;
}

}  // namespace

std::string Bounds::words() const { return plain(least) + " to " + plain(most); }

NumberKey::operator KeyNote() const {
  return {name, "number", bounds.unit, required ? kRequired : plain(fallback), bounds.words()};
}

NumberOrTextKey::operator KeyNote() const {
  return {name, text == Text::path ? "number or path" : "number or field", bounds.unit,
          fallback ? plain(*fallback) : or_required(absent), bounds.words()};
}

WholeKey::operator KeyNote() const {
  return {name, "whole number", bounds.unit, plain(fallback), bounds.words()};
}

MonthsKey::operator KeyNote() const {
  const std::string type = one_will_do ? "one or twelve numbers" : "twelve numbers";
  return {name, type, bounds.unit, or_required(fallback), bounds.words()};
}

TextKey::operator KeyNote() const {
  return {name, "text", "", fallback ? in_quotes(*fallback) : or_required(absent), ""};
}

PathKey::operator KeyNote() const { return {name, "path", "", or_required(absent), ""}; }

FlagKey::operator KeyNote() const {
  const std::string otherwise = fallback ? (*fallback ? "true" : "false") : or_required(absent);
  return {name, "true or false", "", otherwise, ""};
}

DayKey::operator KeyNote() const {
  return {name, "day", "", kRequired, in_quotes("01-01") + " to " + in_quotes("12-31")};
}

TableKey::operator KeyNote() const { return {name, "table", "", or_required(absent), ""}; }

KeyNote choice_note(const std::string& name, const std::vector<std::string>& choices,
                    const std::optional<std::string>& fallback) {
  return {name, "text", "", fallback ? in_quotes(*fallback) : kRequired, listed(all_quoted(choices))};
}

bool TableShape::has(const std::string& key) const {
  return std::any_of(keys.begin(), keys.end(), [&](const KeyNote& note) { return note.name == key; });
}

std::vector<std::string> TableShape::key_names() const {
  std::vector<std::string> names;
  for (const KeyNote& note : keys) names.push_back(note.name);
  return names;
}

}  // namespace sunfall

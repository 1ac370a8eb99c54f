#pragma once
// What a key of the plan may hold. Each table's file declares its keys as constants of these types;
// the reader checks values against them, messages quote them, and docs/plan.md is tested against
// their notes.

#include <map>
#include <optional>
#include <string>
#include <utility>
#include <vector>

namespace sunfall {

// A key as docs/plan.md lists it.
struct KeyNote {
  std::string name;
  std::string type;      // "number", "path", "twelve numbers", …
  std::string unit;      // empty where there is none
  std::string fallback;  // what holds without the key; "required" where nothing does
  std::string range;     // empty where any value of the type will do
};

struct Bounds {
  double least = 0.0;
  double most = 0.0;
  std::string unit;
  std::string remedy;  // for values outside, may be empty

  std::string words() const;  // "0 to 50"
};

struct NumberKey {
  std::string name;
  Bounds bounds;
  double fallback = 0.0;
  bool required = false;  // then there is no fallback
  operator KeyNote() const;
};

// A number, or a text in its place: the path of a raster, or the name of a layer's field. Required where
// there is neither a fallback nor `absent`, which says what it means to leave it out.
struct NumberOrTextKey {
  enum class Text { path, field };

  std::string name;
  Text text;
  Bounds bounds;
  std::optional<double> fallback;
  std::string absent;
  operator KeyNote() const;
};

struct WholeKey {
  std::string name;
  Bounds bounds;
  int fallback = 0;
  operator KeyNote() const;
};

// January to December; where `one_will_do`, one number stands for all twelve.
struct MonthsKey {
  std::string name;
  Bounds bounds;
  bool one_will_do = false;
  std::string fallback;
  operator KeyNote() const;
};

// Without a fallback the key is required; `absent` says what it means to leave an optional one out.
struct TextKey {
  std::string name;
  std::optional<std::string> fallback;
  std::string absent;
  operator KeyNote() const;
};

// A file on disk, relative to the plan's folder. Required where `absent` is empty.
struct PathKey {
  std::string name;
  std::string absent;
  operator KeyNote() const;
};

// Without a fallback the table decides what a missing key means, in the words of `absent`.
struct FlagKey {
  std::string name;
  std::optional<bool> fallback;
  std::string absent;
  operator KeyNote() const;
};

// A day of any year, "MM-DD"; required.
struct DayKey {
  std::string name;
  operator KeyNote() const;
};

// A table of its own inside the table; `absent` says what it means to leave it out.
struct TableKey {
  std::string name;
  std::string absent;
  operator KeyNote() const;
};

template <typename Enum>
struct ChoiceKey {
  std::string name;
  std::vector<std::pair<std::string, Enum>> choices;
  Enum fallback{};
  bool required = false;  // then there is no fallback

  std::vector<std::string> names() const {
    std::vector<std::string> all;
    for (const auto& choice : choices) all.push_back(choice.first);
    return all;
  }
  std::string name_of(Enum value) const {
    for (const auto& choice : choices) {
      if (choice.second == value) return choice.first;
    }
    return "";
  }
  operator KeyNote() const;
};

KeyNote choice_note(const std::string& name, const std::vector<std::string>& choices,
                    const std::optional<std::string>& fallback);

template <typename Enum>
ChoiceKey<Enum>::operator KeyNote() const {
  return choice_note(name, names(), required ? std::nullopt : std::optional(name_of(fallback)));
}

// A table of the plan: its keys and, where it takes names of the user's own, what each such name
// holds.
struct TableShape {
  std::string name;
  std::vector<KeyNote> keys;
  std::vector<TableShape> named = {};             // empty, or one shape
  std::map<std::string, std::string> later = {};  // keys not built yet, and what to do without
  std::vector<TableShape> inner = {};             // of the tables that its keys hold

  bool has(const std::string& key) const;
  std::vector<std::string> key_names() const;
};

}  // namespace sunfall

// Names and values in messages.

#include <gtest/gtest.h>

#include "core/utf8.h"
#include "plan/plan_file.h"
#include "plan/words.h"

namespace sunfall::testing {
namespace {

// RFC 3629 §4 (the ABNF of UTF8-octets): first and last of its rows, and their neighbours outside.
TEST(Utf8, FollowsTheRowsOfRfc3629) {
  const std::vector<std::pair<std::string, std::size_t>> rows = {
      {std::string(1, '\0'), 1},
      {"\x7F", 1},
      {"\x80", 0},  // one byte
      {"\xC1\xBF", 0},
      {"\xC2\x80", 2},
      {"\xDF\xBF", 2},
      {"\xDF\xC0", 0},  // two
      {"\xE0\x9F\x80", 0},
      {"\xE0\xA0\x80", 3},
      {"\xED\x9F\xBF", 3},  // three
      {"\xED\xA0\x80", 0},
      {"\xEF\xBF\xBF", 3},  // the first is a surrogate
      {"\xF0\x8F\xBF\xBF", 0},
      {"\xF0\x90\x80\x80", 4},
      {"\xF4\x8F\xBF\xBF", 4},
      {"\xF4\x90\x80\x80", 0},
      {"\xF5\x80\x80\x80", 0},
      {"\xE2\x82", 0},
      {"\xE2\x82q", 0}};  // the last two are cut short
  for (const auto& [text, length] : rows) EXPECT_EQ(utf8_length(text, 0), length) << in_quotes(text);
}

TEST(Words, AreHarmlessToATerminal) {
  EXPECT_EQ(in_quotes("a\x1B[2Jb\n"), "\"a\\x1B[2Jb\\x0A\"");
  EXPECT_EQ(in_quotes("\xC2\x9B[m"), "\"\\xC2\\x9B[m\"");  // C1 control, 8-bit CSI
  EXPECT_EQ(in_quotes("\xFF"), "\"\\xFF\"");
  EXPECT_EQ(in_quotes("水"), "\"水\"");
}

TEST(Words, AreCutBetweenCharacters) {
  std::string text;
  for (int i = 0; i < 100; ++i) text += "水";  // 3 bytes each: 20 fill the 60 bytes exactly
  EXPECT_EQ(harmless(text, 60), text.substr(0, 60) + "…");
  EXPECT_EQ(harmless(text, 61), text.substr(0, 63) + "…");  // the character begun is finished
}

TEST(Words, ListNames) {
  EXPECT_EQ(listed({}), "");
  EXPECT_EQ(listed({"a"}), "a");
  EXPECT_EQ(listed({"a", "b"}), "a or b");
  EXPECT_EQ(listed({"a", "b", "c"}), "a, b or c");
  EXPECT_EQ(listed(std::vector<std::string>(13, "x")), "x, x, x, x, x, x, x, x, x, x, x, x, …");
}

TEST(PlanFileWhere, ReadsLikeACompilersMessage) {
  const PlanFile file{"fields/farm.toml"};
  EXPECT_EQ(file.where(12, "site.clock"), "fields/farm.toml:12 site.clock");
  EXPECT_EQ(file.where(0, "site"), "fields/farm.toml site");
  EXPECT_EQ(file.where(3, ""), "fields/farm.toml:3");
  EXPECT_EQ(file.folder(), "fields");
  EXPECT_EQ(joined_key("site", "clock"), "site.clock");
  EXPECT_EQ(joined_key("", "clock"), "clock");
  EXPECT_EQ(joined_key("site", "two words"), "site.\"two words\"");
  EXPECT_EQ(joined_key("site", ""), "site");
}

}  // namespace
}  // namespace sunfall::testing

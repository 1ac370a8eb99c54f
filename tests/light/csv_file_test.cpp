// Tables of text as people save them; quoting by RFC 4180.

#include "light/csv_file.h"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "light/text_file.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

using testing::ElementsAre;
using testing::HasSubstr;

std::vector<std::string> values_of(const std::string& content, const CsvOptions& options) {
  const TextFile file(content);
  CsvFile csv(file.path(), options);
  std::vector<std::string> values;
  while (csv.next()) {
    std::string row = std::to_string(csv.line());
    for (std::size_t i = 0; i < options.columns.size(); ++i) row += "|" + std::string(csv.field(i));
    values.push_back(row);
  }
  return values;
}

Error::Parts refusal_of(const std::string& content, const CsvOptions& options) {
  try {
    values_of(content, options);
  } catch (const Error& error) {
    return error.parts();
  }
  ADD_FAILURE() << "accepted";
  return {};
}

const CsvOptions kTimeAndGlobal{'\0', {"time", "ghi"}};

TEST(CsvFile, FindsDelimiterAndColumns) {
  const auto rows = ElementsAre("2|a|1", "3|b|2");
  EXPECT_THAT(values_of("time,x,ghi\na,9,1\nb,9,2\n", kTimeAndGlobal), rows);
  EXPECT_THAT(values_of("ghi;time\n1;a\n2;b\n", kTimeAndGlobal), rows);
  EXPECT_THAT(values_of("x\ttime\tghi\n9\ta\t1\n9\tb\t2", kTimeAndGlobal), rows);
}

TEST(CsvFile, ReadsWhatIsCommonInTheWild) {
  const auto rows = ElementsAre("2|a|1", "3|b|2");
  EXPECT_THAT(values_of("\xEF\xBB\xBFtime,ghi\r\na,1\r\nb,2\r\n", kTimeAndGlobal), rows);
  EXPECT_THAT(values_of("\xEF\xBB\xBF\"time\",\"ghi\"\r\"a\",\"1\"\r\"b\",\"2\"\r", kTimeAndGlobal), rows);
  EXPECT_THAT(values_of(" time , ghi \n a , 1 \n \"b\" , \"2\" \n", kTimeAndGlobal), rows);
  EXPECT_THAT(values_of("Station 7, a hill\n\n# note\ntime,ghi\n\na,1\n", kTimeAndGlobal),
              ElementsAre("6|a|1"));
}

TEST(CsvFile, KnowsQuotes) {
  EXPECT_THAT(
      values_of("time,note,ghi\na,\"say \"\"so\"\", or\nnot\",1\nb,,2\n", {'\0', {"time", "note", "ghi"}}),
      ElementsAre("2|a|say \"so\", or\nnot|1", "4|b||2"));
}

TEST(CsvFile, KeepsADecimalCommaOutOfTheDelimiter) {
  EXPECT_THAT(values_of("time;ghi\na;1,5\n", kTimeAndGlobal), ElementsAre("2|a|1,5"));
  EXPECT_THAT(values_of("time,ghi\na,1\n", {',', {"time", "ghi"}}), ElementsAre("2|a|1"));
}

TEST(CsvFile, CrossesItsBuffersAnywhere) {
  for (const std::string end : {"\n", "\r\n", "\r"}) {
    std::string content = "time,ghi" + end;
    const std::size_t count = 120000;
    for (std::size_t i = 0; i < count; ++i)
      content += std::to_string(i) + ",\"" + std::to_string(i * i % 997) + "\"" + end;
    const TextFile file(content);
    CsvFile csv(file.path(), kTimeAndGlobal);
    std::size_t i = 0;
    for (; csv.next(); ++i) {
      ASSERT_EQ(csv.field(0), std::to_string(i));
      ASSERT_EQ(csv.field(1), std::to_string(i * i % 997));
      ASSERT_EQ(csv.line(), static_cast<long>(i + 2));
    }
    EXPECT_EQ(i, count);
  }
}

TEST(CsvFile, NamesTheMissingColumn) {
  Error::Parts parts = refusal_of("Station 7\ntime;GHI2\n1;2\n", kTimeAndGlobal);
  EXPECT_EQ(parts.what, "the file has no column of that name");
  EXPECT_EQ(parts.found, "\"ghi\"");
  EXPECT_EQ(parts.remedy, "perhaps \"GHI2\" is meant");
  parts = refusal_of("time,temperature\n1,2\n", kTimeAndGlobal);
  EXPECT_EQ(parts.remedy, "its columns are \"time\", \"temperature\"");
  EXPECT_EQ(refusal_of("time;ghi\n1;2\n", {',', {"time", "ghi"}}).found, "\"time\"");
  EXPECT_EQ(refusal_of("time,ghi,ghi\n1,2,3\n", kTimeAndGlobal).what, "two columns have the same name");
}

TEST(CsvFile, RefusesWhatIsNoTable) {
  EXPECT_EQ(refusal_of("", kTimeAndGlobal).what, "the file is empty");
  EXPECT_EQ(refusal_of(std::string("\xFF\xFEt\0i\0", 6), kTimeAndGlobal).found, "text in UTF-16");
  EXPECT_EQ(refusal_of("PK\x03\x04 and so on", kTimeAndGlobal).found, "a zip archive or a spreadsheet");
  EXPECT_EQ(refusal_of("\x89HDF\r\n", kTimeAndGlobal).found, "a NetCDF file");
  EXPECT_EQ(refusal_of(std::string("time,ghi\n1,\0002\n", 13), kTimeAndGlobal).found, "binary");
  EXPECT_THAT(refusal_of("time,ghi\n1,2\n1\n", kTimeAndGlobal).where, HasSubstr(".csv:3"));
  EXPECT_THAT(refusal_of("time,ghi\n1,2\n1\n", kTimeAndGlobal).found, HasSubstr("1 fields"));
  EXPECT_EQ(refusal_of("time,ghi\n1,\"2\n3,4\n", kTimeAndGlobal).what, "a quote is never closed");
  EXPECT_EQ(refusal_of("time,ghi\n1,\"" + std::string(3 << 20, 'x'), kTimeAndGlobal).what,
            "a line is longer than a megabyte");
  EXPECT_THROW(CsvFile("no-such-file.csv", kTimeAndGlobal), Error);
}

TEST(CsvFile, ShowsNothingHarmful) {
  EXPECT_EQ(shown_text("a\x1B[2Jb\xFF"), "\"a?[2Jb?\"");
  EXPECT_EQ(shown_text("µ"), "\"µ\"");
  EXPECT_LT(shown_text(std::string(1000, 'x')).size(), 70U);
}

}  // namespace
}  // namespace sunfall

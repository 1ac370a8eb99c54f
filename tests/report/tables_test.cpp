// CSV tables: quoting as RFC 4180 has it, numbers the same in every locale, exact lines.

#include "report/tables.h"

#include <cmath>
#include <locale>
#include <random>

#include "report_support.h"

namespace sunfall {
namespace {

using TablesTest = FolderTest;

// A reader by the grammar of RFC 4180 §2, with LF for CRLF.
std::vector<std::vector<std::string>> read_csv(const std::string& text) {
  std::vector<std::vector<std::string>> records{{""}};
  bool quoted = false;
  for (std::size_t i = 0; i < text.size(); ++i) {
    const char letter = text[i];
    std::string& field = records.back().back();
    if (quoted) {
      if (letter != '"') {
        field += letter;
      } else if (i + 1 < text.size() && text[i + 1] == '"') {
        field += '"';
        ++i;
      } else {
        quoted = false;
      }
    } else if (letter == '"') {
      EXPECT_TRUE(field.empty()) << "a quote inside a bare field at " << i;
      quoted = true;
    } else if (letter == ',') {
      records.back().emplace_back();
    } else if (letter == '\n') {
      records.emplace_back(1);
    } else {
      field += letter;
    }
  }
  EXPECT_FALSE(quoted);
  records.pop_back();  // after the last line's end
  return records;
}

TEST_F(TablesTest, QuotesAsTheStandardsExamples) {
  // RFC 4180 §2.6 and §2.7.
  CsvTable table({"aaa", "bbb", "ccc"});
  table.add({"aaa", "b\nbb", "ccc"});
  table.add({"aaa", "b\"bb", "c,c"});
  table.add({"", " ", "plain"});
  EXPECT_EQ(table.text(), "aaa,bbb,ccc\naaa,\"b\nbb\",ccc\naaa,\"b\"\"bb\",\"c,c\"\n,\" \",plain\n");
}

TEST_F(TablesTest, AnyFieldsComeBack) {
  std::mt19937 random(3);
  const std::string letters = "a\",\r\n é;";
  std::vector<std::vector<std::string>> written;
  CsvTable table({"one", "two", "three"});
  for (int line = 0; line < 300; ++line) {
    std::vector<std::string> fields(3);
    for (std::string& field : fields) {
      for (auto i = random() % 6; i > 0; --i) field += letters[random() % letters.size()];
    }
    table.add(fields);
    written.push_back(fields);
  }
  auto read = read_csv(table.text());
  ASSERT_FALSE(read.empty());
  read.erase(read.begin());
  EXPECT_EQ(read, written);
}

TEST_F(TablesTest, NumbersHaveDotsAndNoNegativeZero) {
  struct Comma : std::numpunct<char> {
    char do_decimal_point() const override { return ','; }
    char do_thousands_sep() const override { return '.'; }
    std::string do_grouping() const override { return "\3"; }
  };
  const std::locale before = std::locale::global(std::locale(std::locale(), new Comma));
  EXPECT_EQ(csv_number(12345.678, 2), "12345.68");
  std::locale::global(before);
  EXPECT_EQ(csv_number(-0.0001, 2), "0.00");
  EXPECT_EQ(csv_number(-0.006, 2), "-0.01");
  EXPECT_EQ(csv_number(std::nan(""), 2), "");
  EXPECT_EQ(csv_number(INFINITY, 2), "");
  EXPECT_EQ(csv_number(3.0, 0), "3");
}

TEST_F(TablesTest, PlotsHaveARowForEachPeriod) {
  const PlotStatistics january{10, 3.14159, 2.5, 1.0, 4.0, 0.25};
  const PlotStatistics none;
  write_plots_csv(folder_ / "plots.csv", {{"P1, \"low\"", "lettuce", 1234.56, {january, none}}},
                  {"01", "season"});
  EXPECT_EQ(content(folder_ / "plots.csv"),
            "plot,crop,period,area (m2),mean DLI (mol m-2 d-1),P10 DLI (mol m-2 d-1),min DLI (mol m-2 d-1),"
            "max DLI (mol m-2 d-1),CV (1)\n"
            "\"P1, \"\"low\"\"\",lettuce,01,1234.6,3.142,2.500,1.000,4.000,0.2500\n"
            "\"P1, \"\"low\"\"\",lettuce,season,1234.6,,,,,\n");
}

TEST_F(TablesTest, ADayTellsBothClocks) {
  using namespace std::chrono;
  const UtcTime begin = sys_days{2024y / February / 29} + 23h + 50min;
  write_day_csv(folder_ / "day.csv", {{begin, 181.23456, -0.5, 10.04, 20.0, 5.0, 7.25}}, minutes{60});
  const auto east = read_csv(content(folder_ / "day.csv"));
  ASSERT_EQ(east.size(), 2U);
  EXPECT_EQ(east[0][0], "step begins (local standard time)");
  EXPECT_EQ(east[1], (std::vector<std::string>{"2024-03-01T00:50+01:00", "2024-02-29T23:50Z", "181.235",
                                               "-0.500", "10.0", "20.0", "30.0", "5.0", "7.2", "12.2"}));
  write_day_csv(folder_ / "day.csv", {{begin, 0, 0, 0, 0, 0, 0}}, -minutes{210});
  EXPECT_EQ(read_csv(content(folder_ / "day.csv"))[1][0], "2024-02-29T20:20-03:30");
}

}  // namespace
}  // namespace sunfall

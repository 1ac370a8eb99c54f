#pragma once
// Steps without a reading: counted by month, refused where too many, filled by one stated rule.

#include <string>
#include <vector>

#include "light/series_steps.h"

namespace sunfall {

// Of each month of the series, in order: steps with the sun up, and those that are unknown.
struct MonthGaps {
  std::chrono::year_month month{};
  long lit = 0;
  long missing = 0;
  double part() const { return lit > 0 ? static_cast<double>(missing) / static_cast<double>(lit) : 0.0; }
};
std::vector<MonthGaps> count_gaps(const StepLight& steps, const LightSeries& series);

// Throws Error(data) for months of which more than a tenth is missing, unless they are allowed. `rejected`
// says which readings count as missing though they are there, empty where none does.
void check_gaps(const std::vector<MonthGaps>& months, bool allowed, const std::string& where,
                const std::string& rejected = "");

// Every unknown step gets the mean clearness, of beam and of sky, of the same time on the nearest days that
// know it, at most three before and three after within 15 days, else of the same season in other years,
// else of its own day. Returns false where there is nothing to fill from.
bool fill_gaps(StepLight& steps, const LightSeries& series);

// Counts, checks and fills; notes in the series what was filled.
void fill_and_note(StepLight& steps, bool allow_gaps, const std::string& file, const std::string& rejected,
                   LightSeries& series);

// "2019: January 3.2 %, May 0.1 %"; empty without a gap.
std::string gaps_text(const std::vector<MonthGaps>& months);

}  // namespace sunfall

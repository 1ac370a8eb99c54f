#include "plan/light_table.h"

#include <algorithm>

namespace sunfall {
namespace {

// The brightest months on Earth bring little more than 30; a monthly sum or W m-2 lies above 50.
const MonthsKey kMonthlyGlobal{
    "monthly_global",
    {0.0, 50.0, "MJ m-2 d-1",
     "Write the mean day's sum on a level plane: kWh m-2 d-1 times 3.6, mean W m-2 times 0.0864"},
    false,
    "none (one source must be given)"};
const FlagKey kClear{"clear", std::nullopt, "none (one source must be given)"};
const MonthsKey kTurbidity{"turbidity",
                           {1.0, 10.0, "Linke", "Clean cold air has about 2, hazy city air 5 and more"},
                           true,
                           "3 in every month"};
const WholeKey kYear{"year", {1950, 2100, "", "The sun is known for these years"}, 2025};

const char* const kOneSource = "Give either monthly_global = [twelve numbers] or clear = true";

}  // namespace

TableShape light_shape() {
  return {"light",
          {kMonthlyGlobal, kClear, kTurbidity, kYear},
          {},
          {{"series", "Give monthly_global = [twelve numbers] instead, or use a later version"}}};
}

void read_light_table(TableReader& table, Plan& plan) {
  const auto monthly = table.months_if_given(kMonthlyGlobal);
  const bool clear = table.flag_if_given(kClear).value_or(false);
  const auto turbidity = table.months_if_given(kTurbidity);
  plan.light_options.year = table.whole(kYear);

  if (monthly && clear) {
    table.refuse(kClear.name, "two sources of light are given", "monthly_global and clear", kOneSource);
  }
  if (!monthly && !clear) {
    table.refuse("", "no source of light is given", table.has(kClear.name) ? "clear = false" : "",
                 kOneSource);
  }
  if (turbidity && !clear) {
    table.refuse(kTurbidity.name, "turbidity is for a cloudless sky only", "", "Remove it");
  }
  plan.light_where = table.where(monthly ? kMonthlyGlobal.name : kClear.name);
  if (monthly) {
    const bool dark =
        std::all_of(monthly->begin(), monthly->end(), [](double value) { return value == 0.0; });
    if (dark) table.refuse(kMonthlyGlobal.name, "no month has any light", "twelve zeros", "");
    plan.light = MonthlyGlobalSource{*monthly};
    return;
  }
  if (!turbidity) table.note_default(kTurbidity.name, kTurbidity.fallback);
  plan.light = turbidity ? ClearSource{*turbidity} : ClearSource{};
}

}  // namespace sunfall

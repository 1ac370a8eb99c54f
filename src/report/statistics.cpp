#include "report/statistics.h"

#include <algorithm>
#include <cmath>

namespace sunfall {

PlotStatistics statistics(std::vector<float> values) {
  std::erase_if(values, [](float value) { return !std::isfinite(value); });
  PlotStatistics result;
  result.count = values.size();
  if (values.empty()) return result;
  std::sort(values.begin(), values.end());
  const auto count = static_cast<double>(values.size());
  double sum = 0.0;
  for (const float value : values) sum += value;
  result.mean = sum / count;
  double squares = 0.0;
  for (const float value : values) squares += (value - result.mean) * (value - result.mean);
  result.p10 = quantile(values, 0.1);
  result.least = values.front();
  result.most = values.back();
  if (result.mean != 0.0) result.cv = std::sqrt(squares / count) / result.mean;
  return result;
}

}  // namespace sunfall

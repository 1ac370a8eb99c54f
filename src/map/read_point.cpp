#include "map/read_point.h"

#include <utility>

#include "geo/point_series.h"

namespace sunfall {

PointRecord read_point(const GridSource& source, const Place& place) {
  const std::array<const std::string*, 3> names{&source.global, &source.diffuse, &source.beam};
  PointQuery query{source.file, {}, place, source.point == GridSource::Point::bilinear};
  for (const std::string* name : names) {
    if (!name->empty()) query.variables.push_back(*name);
  }
  PointSeries series = read_point_series(query);
  PointRecord record{std::move(series.time_s), std::move(series.run_s), {}, std::move(series.points)};
  std::size_t next = 0;
  for (std::size_t q = 0; q < names.size(); ++q) {
    if (names[q]->empty()) continue;
    PointSeries::Variable& variable = series.variables[next++];
    record.quantities[q] = {std::move(variable.unit), std::move(variable.value)};
  }
  return record;
}

}  // namespace sunfall

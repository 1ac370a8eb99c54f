// How long a study of rows takes: 6 azimuths × 4 spacings × 3 heights under the standard dome, twelve months.
// Checks its answer against the same cases one by one before it prints. Exits 1 where they differ.

#include <fmt/format.h>

#include <chrono>
#include <cmath>

#include "bench/figures.h"
#include "sunfall/light.h"
#include "sunfall/rows.h"

namespace sunfall::bench {
namespace {

RowStudyRequest request_of(RowSection section, bool leafing) {
  RowStudyRequest request;
  request.rows.section = section;
  for (int i = 0; i < 6; ++i) request.azimuths.push_back({Angle::degrees(30.0 * i)});
  request.spacings_m = {2.5, 3.0, 3.5, 4.5};
  request.heights_m = {2.0, 2.8, 3.6};
  if (leafing) request.leafing = {0.15, 0.15, 0.2, 0.5, 0.9, 1, 1, 1, 0.9, 0.6, 0.3, 0.15};
  return request;
}

bool same_one_by_one(const DomeLight& light, const RowStudyRequest& request, const RowStudy& study) {
  for (std::size_t i = 0; i < study.cases.size(); i += 7) {
    const RowCase& found = study.cases[i];
    RowStudyRequest one = request;
    one.azimuths = {found.azimuth};
    one.spacings_m = {found.spacing_m};
    one.heights_m = {found.height_m};
    const RowCase alone = study_rows(light, one).cases[0];
    for (std::size_t p = 0; p < found.taken.size(); ++p) {
      if (std::abs(found.taken[p] - alone.taken[p]) > 1e-12) return false;
      if (std::abs(found.floor_least[p] - alone.floor_least[p]) > 1e-12) return false;
    }
  }
  return true;
}

}  // namespace

bool run() {
  Findings findings;
  fmt::print("{}\n\n", machine_line());
  const Place place{Angle::degrees(52.0), Angle::degrees(5.0), 10.0};
  const LightSeries series =
      make_light(ClearSource{}, place, Clock::parse("+01:00", "bench"), {.year = 2025}, "bench");
  const DomeLight light =
      make_dome_light(series, Dome::of(DomeQuality::standard), SkyModel::clearness, month_periods());
  print_times_head();
  const struct {
    const char* name;
    RowSection section;
    bool leafing;
  } studies[] = {{"boxes", RowSection::box, false},
                 {"boxes, eight states of leaf", RowSection::box, true},
                 {"ellipses", RowSection::ellipse, false},
                 {"wedges", RowSection::wedge, false}};
  for (const auto& one : studies) {
    const RowStudyRequest request = request_of(one.section, one.leafing);
    RowStudy study;
    Repeats times;
    for (int i = 0; i < 7; ++i) {
      const Meter meter;
      study = study_rows(light, request);
      times.add(meter.cost());
    }
    print_times(fmt::format("study of 72 cases, {}", one.name), times);
    findings.check(study.cases.size() == 72 && same_one_by_one(light, request, study),
                   fmt::format("{}: all cases at once as one by one", one.name));
  }
  findings.print();
  return findings.answers_hold();
}

}  // namespace sunfall::bench

int main() { return sunfall::bench::run() ? 0 : 1; }

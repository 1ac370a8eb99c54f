#include "light/grid.h"

#include <fmt/format.h>

#include "light/accumulation.h"
#include "light/csv_file.h"
#include "light/flux_unit.h"
#include "light/record_step.h"
#include "light/series.h"
#include "light/unit_text.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

using Unit = SeriesSource::Unit;
using Accumulated = GridSource::Accumulated;

constexpr float kBeamOverGlobal = 0.08F;  // the closure of Long and Shi (2008) for a high sun

bool is_energy(Unit unit) { return unit != Unit::w_m2 && unit != Unit::umol_m2_s; }

class GridReadings {
 public:
  GridReadings(const GridSource& source, const LightRequest& request)
      : source_(source), request_(request), record_(request.options.read_point(source, request.place)) {
    readings_.file = source.file.string();
    readings_.zone_known = true;
    readings_.notes.push_back(fmt::format("the light is that of {} in {}: {}",
                                          source.point == GridSource::Point::bilinear
                                              ? "the points around the map"
                                              : "the point nearest to the map",
                                          source.file.filename().string(), record_.points));
  }

  // What the pipeline of records needs to know of this one.
  SeriesSource as_record() {
    SeriesSource record;
    record.file = source_.file;
    record.global = source_.global;
    record.diffuse = beam_is_level() ? source_.beam : source_.diffuse;
    record.beam = beam_is_level() ? "" : source_.beam;
    record.stamp = source_.stamp;
    record.unit = unit();
    record.utc = true;
    record.split = source_.split;
    record.allow_gaps = source_.allow_gaps;
    record.trust_clock = source_.trust_clock;
    return record;
  }

  Readings take(Unit unit) {
    readings_.step = record_step(record_.time_s, readings_.file, [&](std::size_t i) {
      return fmt::format("{} time number {}", readings_.file, i + 1);
    });
    const std::int64_t back_s = begin_before_stamp_s(source_.stamp, readings_.step);
    for (const std::int64_t time_s : record_.time_s) readings_.begin_s.push_back(time_s - back_s);
    long resets = 0;
    for (std::size_t q = 0; q < kQuantities; ++q) {
      if (column_of(source_, q).empty()) continue;
      std::vector<double>& value = record_.quantities[q].value;
      if (is_energy(unit)) check_sums(value, q);
      if (source_.accumulated == Accumulated::start) {
        StepEnergies energies = step_energies(value, record_.time_s, record_.run_s, readings_.step);
        value = std::move(energies.value);
        resets = energies.resets;
      }
      readings_.value[q].assign(value.begin(), value.end());
    }
    if (beam_is_level()) take_diffuse();
    if (source_.accumulated == Accumulated::start) {
      readings_.notes.push_back(
          fmt::format("sums since a forecast's start were made into those of single steps; they "
                      "began anew {} times",
                      resets));
    }
    return std::move(readings_);
  }

 private:
  [[noreturn]] void refuse(std::string what, std::string found, std::string remedy) const {
    throw Error(ErrorKind::data, {std::move(what), readings_.file, std::move(found), std::move(remedy)});
  }

  bool beam_is_level() const {
    return !source_.beam.empty() && source_.beam_plane == GridSource::BeamPlane::level;
  }

  // What of the global is not beam. A little less than none is the file's rounding; a lot is left for the
  // limits to refuse.
  void take_diffuse() {
    const std::vector<float>& global = readings_.value[kGlobal];
    std::vector<float> diffuse = std::move(readings_.value[kBeam]);
    readings_.value[kBeam].clear();
    for (std::size_t i = 0; i < diffuse.size(); ++i) {
      diffuse[i] = global[i] - diffuse[i];
      if (diffuse[i] < 0.0F && diffuse[i] > -kBeamOverGlobal * global[i]) diffuse[i] = 0.0F;
    }
    readings_.value[kDiffuse] = std::move(diffuse);
  }

  // The unit that all variables share, by the file, by the plan, or by both.
  Unit unit() {
    std::optional<Unit> unit = source_.unit;
    for (std::size_t q = 0; q < kQuantities; ++q) {
      const std::string& name = column_of(source_, q);
      if (name.empty()) continue;
      const std::string& text = record_.quantities[q].unit;
      const auto known = unit_of_text(text);
      if (!known && !unit) {
        refuse(text.empty() ? "the file does not say the unit" : "the file's unit is none of light",
               text.empty() ? name : fmt::format("{} in {}", name, shown_text(text)),
               "if it is radiation or photons all the same, give unit = \"…\" in the plan");
      }
      if (!known) {
        const std::string words =
            text.empty() ? "the file does not say the unit of" : "the file's unit is not known of";
        readings_.notes.push_back(fmt::format("{} {}{}; the plan's was taken, {}", words, name,
                                              text.empty() ? "" : ", " + shown_text(text), unit_name(*unit)));
        continue;
      }
      if (!unit) {
        unit = known;
        readings_.notes.push_back(fmt::format("the unit is the file's own, {}", unit_name(*unit)));
      }
      if (*unit == *known) continue;
      refuse(source_.unit ? "the file's unit is not the plan's" : "the variables have different units",
             fmt::format("{} in {}, not {}", name, unit_name(*known), unit_name(*unit)),
             source_.unit ? "give the file's unit in the plan, or remove it" : "bring them to one unit");
    }
    if (!unit) {
      throw Error(ErrorKind::plan,
                  {"no variable is named", request_.where, "", "name global, or diffuse and beam"});
    }
    if (source_.accumulated == Accumulated::start && !is_energy(*unit)) {
      refuse("only energies are sums since a forecast's start", unit_name(*unit),
             "remove accumulated = \"start\", or name the variable that is summed up");
    }
    return *unit;
  }

  void check_sums(const std::vector<double>& value, std::size_t quantity) const {
    const bool start = source_.accumulated == Accumulated::start;
    if (start == look_accumulated(value) || (start && !record_.run_s.empty())) return;
    refuse(start ? "the values are not sums since a forecast's start"
                 : "the values grow from step to step, as sums since a forecast's start do",
           column_of(source_, quantity),
           start ? "remove accumulated = \"start\"" : "give accumulated = \"start\"");
  }

  const GridSource& source_;
  const LightRequest& request_;
  PointRecord record_;
  Readings readings_;
};

}  // namespace

LightSeries make_series(const GridSource& source, const LightRequest& request) {
  if (!request.options.read_point) {
    throw Error(ErrorKind::internal,
                {"nothing was handed in that reads gridded files", request.where, "", ""});
  }
  GridReadings readings(source, request);
  const SeriesSource record = readings.as_record();
  check_columns(record, request.where);
  return series_of(readings.take(record.unit), record, request);
}

}  // namespace sunfall

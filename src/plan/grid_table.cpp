#include "plan/grid_table.h"

#include "plan/record_keys.h"

namespace sunfall {
namespace {

using Accumulated = GridSource::Accumulated;
using BeamPlane = GridSource::BeamPlane;
using Point = GridSource::Point;
using Stamp = SeriesSource::Stamp;
using Unit = SeriesSource::Unit;

const PathKey kFile{"file", ""};
const TextKey kGlobal{"global", std::nullopt, "none (no such variable)"};
const TextKey kDiffuse{"diffuse", std::nullopt, "none (no such variable)"};
const TextKey kBeam{"beam", std::nullopt, "none (no such variable)"};
const ChoiceKey<BeamPlane> kBeamPlane{
    "beam_plane", {{"sun", BeamPlane::sun}, {"level", BeamPlane::level}}, BeamPlane::sun};
const ChoiceKey<Stamp> kStamp{
    "stamp", {{"begin", Stamp::begin}, {"middle", Stamp::middle}, {"end", Stamp::end}}, Stamp::end, true};
const ChoiceKey<std::optional<Unit>> kUnit{"unit",
                                           {{"file", std::nullopt},
                                            {"W m-2", Unit::w_m2},
                                            {"J m-2", Unit::j_m2},
                                            {"J cm-2", Unit::j_cm2},
                                            {"kJ m-2", Unit::kj_m2},
                                            {"MJ m-2", Unit::mj_m2},
                                            {"Wh m-2", Unit::wh_m2},
                                            {"kWh m-2", Unit::kwh_m2},
                                            {"µmol m-2 s-1", Unit::umol_m2_s},
                                            {"umol m-2 s-1", Unit::umol_m2_s}},
                                           std::nullopt};
const ChoiceKey<Accumulated> kAccumulated{
    "accumulated", {{"step", Accumulated::step}, {"start", Accumulated::start}}, Accumulated::step};
const ChoiceKey<Point> kPoint{
    "point", {{"nearest", Point::nearest}, {"bilinear", Point::bilinear}}, Point::nearest};

void check_variables(const TableReader& table, const GridSource& source) {
  const bool parts = !source.diffuse.empty() && !source.beam.empty();
  if (source.global.empty() && !parts) {
    table.refuse("", "no variable of global radiation is named", "",
                 "Add global = \"<the variable's name>\", or both diffuse and beam");
  }
  if (!source.beam.empty() && !table.has(kBeamPlane.name)) {
    table.refuse(kBeamPlane.name, "it is not said what plane the beam is counted on", "",
                 "Give beam_plane = \"sun\" for a plane that faces the sun, \"level\" for the ground's");
  }
  if (!source.beam.empty() && source.beam_plane == BeamPlane::level &&
      (source.global.empty() || !source.diffuse.empty())) {
    table.refuse(kBeamPlane.name, "beam on the level goes with global alone: the rest is diffuse", "",
                 source.global.empty() ? "Name global" : "Remove diffuse or beam");
  }
  if (source.accumulated == Accumulated::start && source.stamp != Stamp::end) {
    table.refuse(kStamp.name, "a sum since the forecast's start ends at its time", "",
                 "Give stamp = \"end\"");
  }
}

}  // namespace

TableShape grid_shape() {
  return {"light.grid",
          {kFile, kGlobal, kDiffuse, kBeam, kBeamPlane, kStamp, kUnit, kAccumulated, kPoint, kHourSplit,
           kAllowGaps, kTrustClock}};
}

GridSource read_grid_table(TableReader& table) {
  GridSource source;
  source.file = table.path(kFile);
  source.global = table.optional_text(kGlobal).value_or("");
  source.diffuse = table.optional_text(kDiffuse).value_or("");
  source.beam = table.optional_text(kBeam).value_or("");
  source.beam_plane = table.choice(kBeamPlane);
  source.stamp = table.choice(kStamp);
  source.unit = table.choice(kUnit);
  source.accumulated = table.choice(kAccumulated);
  source.point = table.choice(kPoint);
  source.split = table.choice(kHourSplit);
  source.allow_gaps = table.flag(kAllowGaps);
  source.trust_clock = table.flag(kTrustClock);
  check_variables(table, source);
  table.finish();
  return source;
}

}  // namespace sunfall

#include "report/summary.h"

#include <cmath>
#include <nlohmann/json.hpp>

#include "core/lowest_month.h"
#include "core/whole_file.h"

namespace sunfall {
namespace {

using Json = nlohmann::ordered_json;

Json number(double value) { return std::isfinite(value) ? Json(value) : Json(nullptr); }

Json numbers(const std::array<double, 12>& values) {
  Json list = Json::array();
  for (const double value : values) list.push_back(number(value));
  return list;
}

Json inputs_json(const Summary& summary) {
  Json list = Json::array();
  for (const Summary::Input& input : summary.inputs) {
    list.push_back({{"path", input.path}, {"size", input.print.size}, {"sha256", input.print.sha256}});
  }
  return list;
}

Json layers_json(const Summary& summary) {
  Json list = Json::array();
  for (const Summary::Layer& layer : summary.layers) {
    list.push_back({{"file", layer.file},
                    {"description", layer.description},
                    {"unit", layer.unit},
                    {"size", layer.print.size},
                    {"sha256", layer.print.sha256}});
  }
  return list;
}

// Adds dli_month_p10 to dli_year_p90 under "over_years".
void add_over_years(Json& json, const std::vector<YearPercentiles>& over_years) {
  if (over_years.empty()) return;
  Json& out = json["over_years"];
  for (std::size_t i = 0; i < kYearPercents.size(); ++i) {
    std::array<double, 12> months{};
    for (std::size_t m = 0; m < 12; ++m) months[m] = over_years[m][i];
    const std::string percent = "_p" + std::to_string(kYearPercents[i]);
    out["dli_month" + percent] = numbers(months);
    out["dli_year" + percent] = number(over_years.back()[i]);
  }
}

Json open_field_json(const Summary& summary) {
  Json json{{"dli_month", numbers(summary.open_field.dli_month)},
            {"dli_year", number(summary.open_field.dli_year)},
            {"beam_part_month", numbers(summary.open_field.beam_part_month)}};
  json["periods"] = Json::array();
  for (const Summary::PeriodLight& light : summary.open_field.periods) {
    json["periods"].push_back({{"name", light.period.name},
                               {"from", day_key(light.period.from)},
                               {"to", day_key(light.period.to)},
                               {"beam", number(light.beam)},
                               {"sky", number(light.sky)}});
  }
  add_over_years(json, summary.open_field.over_years);
  if (!summary.open_field.years.empty()) json["years"] = Json::array();
  for (const Summary::YearLight& year : summary.open_field.years) {
    json["years"].push_back({{"year", year.year},
                             {"beam_month", numbers(year.beam_month)},
                             {"sky_month", numbers(year.sky_month)},
                             {"dli_year", number(year.dli_year)}});
  }
  return json;
}

Json plots_json(const Summary& summary) {
  Json list = Json::array();
  for (const Summary::PlotLight& plot : summary.plots) {
    list.push_back({{"id", plot.id},
                    {"area_m2", number(plot.area_m2)},
                    {"dli_month_mean", numbers(plot.dli_month_mean)},
                    {"dli_month_p10", numbers(plot.dli_month_p10)},
                    {"lowest_month", plot.lowest_month > 0 ? Json(plot.lowest_month) : Json(nullptr)}});
    add_over_years(list.back(), plot.over_years);
  }
  return list;
}

}  // namespace

int lowest_month(const std::array<double, 12>& by_month) {
  return 1 + lowest_month_of([&](int m) { return by_month[static_cast<std::size_t>(m)]; });
}

std::string summary_json(const Summary& summary) {
  Json json;
  json["plan"] = summary.plan;
  json["version"] = summary.version;
  json["inputs"] = inputs_json(summary);
  json["geometry"] = Json::object();
  for (const auto& [key, value] : summary.geometry) json["geometry"][key] = value;
  if (!summary.shares_from.empty()) json["shares_from"] = summary.shares_from;
  json["place"] = {{"longitude", number(summary.place.longitude)},
                   {"latitude", number(summary.place.latitude)},
                   {"convergence_deg", number(summary.place.convergence_deg)}};
  json["light"] = {{"description", summary.light.description},
                   {"is_ceiling", summary.light.is_ceiling},
                   {"umol_per_joule", number(summary.light.umol_per_joule)}};
  json["dome"] = {{"sectors", summary.dome.sectors}, {"bands", summary.dome.bands}};
  json["open_field"] = open_field_json(summary);
  json["grid"] = {{"columns", summary.grid.columns},
                  {"rows", summary.grid.rows},
                  {"cell_m", number(summary.grid.cell_m)},
                  {"valid_fraction", number(summary.grid.valid_fraction)}};
  json["plots"] = plots_json(summary);
  json["layers"] = layers_json(summary);
  json["timings_s"] = Json::object();
  for (const auto& [stage, seconds] : summary.timings_s) json["timings_s"][stage] = number(seconds);
  json["notes"] = summary.notes;
  // Names come from files: bytes that are no UTF-8 become U+FFFD instead of ending the run.
  return json.dump(2, ' ', false, Json::error_handler_t::replace) + "\n";
}

void write_summary(const std::filesystem::path& file, const Summary& summary) {
  write_whole_file(file, summary_json(summary));
}

}  // namespace sunfall

#include "report/summary.h"

#include <cmath>
#include <nlohmann/json.hpp>

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

Json plots_json(const Summary& summary) {
  Json list = Json::array();
  for (const Summary::PlotLight& plot : summary.plots) {
    list.push_back({{"id", plot.id},
                    {"area_m2", number(plot.area_m2)},
                    {"dli_month_mean", numbers(plot.dli_month_mean)},
                    {"dli_month_p10", numbers(plot.dli_month_p10)},
                    {"lowest_month", plot.lowest_month > 0 ? Json(plot.lowest_month) : Json(nullptr)}});
  }
  return list;
}

}  // namespace

int lowest_month(const std::array<double, 12>& by_month) {
  int lowest = 0;
  for (int month = 1; month <= 12; ++month) {
    const double value = by_month[month - 1];
    if (std::isfinite(value) && (lowest == 0 || value < by_month[lowest - 1])) lowest = month;
  }
  return lowest;
}

std::string summary_json(const Summary& summary) {
  Json json;
  json["plan"] = summary.plan;
  json["version"] = summary.version;
  json["inputs"] = inputs_json(summary);
  json["place"] = {{"longitude", number(summary.place.longitude)},
                   {"latitude", number(summary.place.latitude)},
                   {"convergence_deg", number(summary.place.convergence_deg)}};
  json["light"] = {{"description", summary.light.description},
                   {"is_ceiling", summary.light.is_ceiling},
                   {"umol_per_joule", number(summary.light.umol_per_joule)}};
  json["dome"] = {{"sectors", summary.dome.sectors}, {"bands", summary.dome.bands}};
  json["open_field"] = {{"dli_month", numbers(summary.open_field.dli_month)},
                        {"dli_year", number(summary.open_field.dli_year)},
                        {"beam_part_month", numbers(summary.open_field.beam_part_month)}};
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

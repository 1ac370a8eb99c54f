#include "report/write_run.h"

#include <fmt/format.h>

#include <chrono>
#include <cmath>

#include "core/fingerprint.h"
#include "core/month_names.h"
#include "geo/layer_writer.h"
#include "map/layers.h"
#include "report/contact_sheet.h"
#include "report/statistics.h"
#include "report/style_sld.h"
#include "report/summary.h"
#include "report/tables.h"
#include "sunfall/error.h"
#include "sunfall/version.h"

namespace sunfall {
namespace {

constexpr int kPreviewSide = 900;  // cells; more would not show in the pictures

std::string layer_file(const Period& period) { return "dli-" + period.name + ".tif"; }

// Statistics of every plot, from one layer after another: memory for one layer at a time.
class PlotLight {
 public:
  PlotLight(const std::vector<Plot>& plots, const GridFrame& frame)
      : cells_(plots.empty() ? std::vector<std::vector<CellIndex>>{} : cells_of_plots(plots, frame)),
        rows_(plots.size()) {
    for (std::size_t i = 0; i < plots.size(); ++i)
      rows_[i] = {plots[i].id, plots[i].crop, plots[i].area_m2, {}};
  }

  void add_period(const Grid<float>& layer) {
    for (std::size_t i = 0; i < rows_.size(); ++i) {
      std::vector<float> values;
      values.reserve(cells_[i].size());
      for (const CellIndex& cell : cells_[i]) values.push_back(layer.at(cell.column, cell.row));
      rows_[i].by_period.push_back(statistics(std::move(values)));
    }
  }
  const std::vector<PlotRow>& rows() const { return rows_; }

 private:
  std::vector<std::vector<CellIndex>> cells_;
  std::vector<PlotRow> rows_;
};

// An input's path as the plan writes it.
std::string plan_path(const Plan& plan, const std::filesystem::path& file) {
  const std::filesystem::path folder = plan.file.parent_path();
  const std::filesystem::path relative = folder.empty() ? file : file.lexically_relative(folder);
  return (relative.empty() ? file : relative).generic_string();
}

MapContext context_of(const Plan& plan, const Site& site, const std::vector<Plot>& plots) {
  MapContext context;
  context.text.title = plan.name;
  context.text.place = place_text(site.middle.place) + " · " + crs_name(site.frame);
  context.text.light = site.series.description;
  context.text.is_ceiling = site.series.is_ceiling;
  context.convergence_deg = site.middle.convergence.degrees();
  for (const Plot& plot : plots) context.plots.push_back({plot.id, plot.rings});
  return context;
}

// The numbers come from the whole layer, the picture from a preview.
MapPanel panel_of(const std::filesystem::path& file, const std::string& name, const Grid<float>& layer,
                  double open_field) {
  return {name, read_preview(file, kPreviewSide), numbers_of(layer, open_field)};
}

std::vector<PlotColumn> plot_columns(const std::vector<PlotRow>& rows, const std::vector<Period>& periods) {
  std::vector<PlotColumn> columns;
  PlotColumn areas{"area_m2", {}, {}};
  for (const PlotRow& row : rows) areas.numbers.push_back(row.area_m2);
  columns.push_back(std::move(areas));
  for (std::size_t p = 0; p < periods.size(); ++p) {
    PlotColumn mean{"dli_" + periods[p].name + "_mean", {}, {}},
        p10{"dli_" + periods[p].name + "_p10", {}, {}};
    for (const PlotRow& row : rows) {
      mean.numbers.push_back(row.by_period[p].mean);
      p10.numbers.push_back(row.by_period[p].p10);
    }
    columns.push_back(std::move(mean));
    columns.push_back(std::move(p10));
  }
  return columns;
}

std::vector<Summary::Input> inputs_of(const Plan& plan) {
  std::vector<Summary::Input> inputs;
  const auto add = [&](const std::filesystem::path& file) {
    inputs.push_back({plan_path(plan, file), fingerprint(file)});
  };
  add(plan.file);
  add(plan.site.ground);
  if (plan.site.surface) add(*plan.site.surface);
  if (plan.site.far_ground) add(*plan.site.far_ground);
  if (plan.plots) add(plan.plots->file);
  return inputs;
}

Summary summary_of(const Plan& plan, const Site& site, const MapResult& maps,
                   const std::vector<PlotRow>& rows, const std::filesystem::path& folder) {
  Summary summary;
  summary.plan = plan.name;
  summary.version = kVersion;
  summary.inputs = inputs_of(plan);
  summary.place.longitude = site.middle.place.longitude.degrees();
  summary.place.latitude = site.middle.place.latitude.degrees();
  summary.place.convergence_deg = site.middle.convergence.degrees();
  summary.light.description = site.series.description;
  summary.light.is_ceiling = site.series.is_ceiling;
  summary.light.umol_per_joule = umol_per_joule(site.series);
  const Dome dome = Dome::of(plan.dome.quality);
  summary.dome.sectors = dome.sectors;
  summary.dome.bands = dome.bands;
  for (std::size_t m = 0; m < 12; ++m) {
    const double open = maps.open.beam[m] + maps.open.sky[m];
    summary.open_field.dli_month[m] = open;
    summary.open_field.beam_part_month[m] = open > 0.0 ? maps.open.beam[m] / open : kMissing;
  }
  summary.open_field.dli_year = maps.open.year;
  summary.grid.columns = maps.frame.columns;
  summary.grid.rows = maps.frame.rows;
  summary.grid.cell_m = maps.frame.cell_m;
  summary.grid.valid_fraction = maps.valid_fraction;
  for (const PlotRow& row : rows) {
    Summary::PlotLight plot;
    plot.id = row.id;
    plot.area_m2 = row.area_m2;
    for (std::size_t m = 0; m < 12; ++m) {
      plot.dli_month_mean[m] = row.by_period[m].mean;
      plot.dli_month_p10[m] = row.by_period[m].p10;
    }
    plot.lowest_month = lowest_month(plot.dli_month_mean);
    summary.plots.push_back(std::move(plot));
  }
  for (const MapLayer& layer : maps.layers) {
    summary.layers.push_back(
        {layer.file_name, layer.description, layer.unit, fingerprint(folder / layer.file_name)});
  }
  for (const auto& [stage, seconds] : maps.seconds) summary.timings_s.emplace_back(stage, seconds);
  summary.notes = site.notes;
  for (const std::string& choice : plan.defaults) summary.notes.push_back("Left open in the plan: " + choice);
  summary.notes.push_back(
      fmt::format("The inputs cover {:.1f} % of the horizon (mean of sight.tif).", 100.0 * maps.mean_sight));
  return summary;
}

}  // namespace

std::string place_text(const Place& place) {
  const double longitude = place.longitude.degrees(), latitude = place.latitude.degrees();
  return fmt::format("{:.4f}° {}, {:.4f}° {}", std::abs(longitude), longitude < 0 ? "W" : "E",
                     std::abs(latitude), latitude < 0 ? "S" : "N");
}

std::vector<Plot> plots_of(const Plan& plan, const GridFrame& frame) {
  if (!plan.plots) return {};
  return read_plots({plan.plots->file, plan.plots->layer, plan.plots->id, plan.plots->crop}, frame);
}

void write_run(const Plan& plan, const Site& site, const MapResult& maps, const std::vector<Plot>& plots,
               const std::filesystem::path& folder, Progress& progress) {
  const auto begin = std::chrono::steady_clock::now();
  const MapContext context = context_of(plan, site, plots);
  PlotLight plot_light(plots, maps.frame);
  const CellWindow whole{0, 0, maps.frame.columns, maps.frame.rows};
  ContactSheet sheet{context, {}};
  const std::size_t periods = maps.periods.size();
  for (std::size_t p = 0; p < periods; ++p) {
    if (progress.stop_requested())
      throw Error(ErrorKind::interrupted,
                  {"stopped before the run was done", "", "", "Run the same command again"});
    const std::filesystem::path file = folder / layer_file(maps.periods[p]);
    const Grid<float> layer = read_layer(file, whole);
    plot_light.add_period(layer);
    if (p < 12)
      sheet.months.push_back(panel_of(file, month_name(p), layer, maps.open.beam[p] + maps.open.sky[p]));
    progress.advance("tables and pictures", double(p + 1) / double(periods + 2));
  }
  draw_contact_sheet(folder / "months.png", sheet);
  const std::filesystem::path year = folder / "dli-year.tif";
  const Grid<float> year_layer = read_layer(year, whole);
  draw_map(folder / "year.png",
           {context, "Daily light, mean of the year", panel_of(year, "Year", year_layer, maps.open.year)});
  progress.advance("tables and pictures", double(periods + 1) / double(periods + 2));

  RasterStyle style;
  style.scale = shared_scale(sheet.months);
  write_raster_sld(folder / "style-dli.sld", style);
  if (!plots.empty()) {
    std::vector<std::string> names;
    for (const Period& period : maps.periods) names.push_back(period.name);
    write_plots_csv(folder / "plots.csv", plot_light.rows(), names);
    write_plots_gpkg(folder / "plots.gpkg", plots, plot_columns(plot_light.rows(), maps.periods), maps.frame);
  }
  Summary summary = summary_of(plan, site, maps, plot_light.rows(), folder);
  summary.timings_s.emplace_back(
      "tables and pictures", std::chrono::duration<double>(std::chrono::steady_clock::now() - begin).count());
  write_summary(folder / "summary.json", summary);
  progress.advance("tables and pictures", 1.0);
}

}  // namespace sunfall

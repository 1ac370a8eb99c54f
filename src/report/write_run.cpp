#include "report/write_run.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "core/fingerprint.h"
#include "core/month_names.h"
#include "core/parallel.h"
#include "geo/layer_writer.h"
#include "map/casters.h"
#include "map/layers.h"
#include "report/contact_sheet.h"
#include "report/rows_table.h"
#include "report/statistics.h"
#include "report/style_sld.h"
#include "report/summary.h"
#include "report/tables.h"
#include "report/years_table.h"
#include "sunfall/error.h"
#include "sunfall/version.h"

namespace sunfall {
namespace {

constexpr int kPreviewSide = 900;  // cells; more would not show in the pictures

std::string layer_file(const Period& period) { return "dli-" + period.name + ".tif"; }

// One layer of light read back: its numbers, its plots, its picture.
struct LayerLight {
  MapNumbers numbers;
  std::vector<PlotStatistics> plots;
  Grid<float> preview;
};

using PlotCells = std::vector<std::vector<CellIndex>>;

// Reads a layer in strips, so that memory does not follow the map. The cells of a plot are sorted by
// row.
LayerLight read_light(const std::filesystem::path& file, const GridFrame& frame, const PlotCells& cells) {
  constexpr int kStrip = 512;
  LayerLight light;
  std::vector<std::vector<float>> values(cells.size());
  std::vector<std::size_t> next(cells.size(), 0);
  double sum = 0.0;
  std::size_t count = 0;
  for (int row = 0; row < frame.rows; row += kStrip) {
    const Grid<float> strip = read_layer(file, {0, row, frame.columns, std::min(kStrip, frame.rows - row)});
    for (const float value : strip.values()) {
      if (std::isnan(value)) continue;
      sum += value;
      light.numbers.least = std::fmin(light.numbers.least, value);
      light.numbers.most = std::fmax(light.numbers.most, value);
      ++count;
    }
    for (std::size_t plot = 0; plot < cells.size(); ++plot) {
      for (; next[plot] < cells[plot].size() && cells[plot][next[plot]].row < row + strip.rows();
           ++next[plot]) {
        const CellIndex cell = cells[plot][next[plot]];
        values[plot].push_back(strip.at(cell.column, cell.row - row));
      }
    }
  }
  if (count > 0) light.numbers.mean = sum / double(count);
  for (std::vector<float>& plot : values) light.plots.push_back(statistics(std::move(plot)));
  light.preview = read_preview(file, kPreviewSide);
  return light;
}

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

MapPanel panel_of(const std::string& name, LayerLight light, double open_field) {
  light.numbers.open_field = open_field;
  return {name, std::move(light.preview), light.numbers};
}

std::vector<PlotRow> plot_rows(const std::vector<Plot>& plots, const std::vector<LayerLight>& periods,
                               const MapResult& maps) {
  std::vector<PlotRow> rows;
  for (std::size_t i = 0; i < plots.size(); ++i) {
    PlotRow row{plots[i].id, plots[i].crop, plots[i].area_m2, {}, {}};
    if (has_percentiles(maps.open)) row.over_years = percentiles_of(maps.open, maps.plot_shares[i]);
    for (const LayerLight& period : periods) row.by_period.push_back(period.plots[i]);
    rows.push_back(std::move(row));
  }
  return rows;
}

std::vector<PlotColumn> plot_columns(const std::vector<PlotRow>& rows,
                                     const std::vector<std::string>& periods) {
  std::vector<PlotColumn> columns;
  PlotColumn areas{"area_m2", {}, {}};
  for (const PlotRow& row : rows) areas.numbers.push_back(row.area_m2);
  columns.push_back(std::move(areas));
  for (std::size_t p = 0; p < periods.size(); ++p) {
    PlotColumn mean{"dli_" + periods[p] + "_mean", {}, {}}, p10{"dli_" + periods[p] + "_p10", {}, {}};
    for (const PlotRow& row : rows) {
      mean.numbers.push_back(row.by_period[p].mean);
      p10.numbers.push_back(row.by_period[p].p10);
    }
    columns.push_back(std::move(mean));
    columns.push_back(std::move(p10));
    if (rows.empty() || rows.front().over_years.empty()) continue;
    for (std::size_t k = 0; k < kYearPercents.size(); ++k) {
      PlotColumn over_years{fmt::format("dli_{}_years_p{}", periods[p], kYearPercents[k]), {}, {}};
      for (const PlotRow& row : rows) over_years.numbers.push_back(row.over_years[p][k]);
      columns.push_back(std::move(over_years));
    }
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
  for (const std::filesystem::path& file : files_of(plan.light)) add(file);
  if (plan.plots) add(plan.plots->file);
  for (const std::filesystem::path& file : files_of_casters(plan)) {
    if (!plan.plots || file != plan.plots->file) add(file);
  }
  return inputs;
}

std::vector<Summary::YearLight> years_of(const OpenField& open) {
  const std::vector<double> everything(2 * open.beam.size(), 1.0);
  std::vector<Summary::YearLight> years;
  for (const OpenYear& year : open.years) {
    Summary::YearLight out{year.year, {}, {}, dli_in_year(year, everything).back()};
    std::copy_n(year.beam.begin(), 12, out.beam_month.begin());
    std::copy_n(year.sky.begin(), 12, out.sky_month.begin());
    years.push_back(out);
  }
  return years;
}

Summary summary_of(const Plan& plan, const Site& site, const MapResult& maps,
                   const std::vector<PlotRow>& rows, const std::filesystem::path& folder, int jobs) {
  Summary summary;
  summary.plan = plan.name;
  summary.version = kVersion;
  summary.inputs = inputs_of(plan);
  summary.geometry = geometry_of(plan);
  summary.shares_from = maps.shares_from;
  summary.place.longitude = site.middle.place.longitude.degrees();
  summary.place.latitude = site.middle.place.latitude.degrees();
  summary.place.convergence_deg = site.middle.convergence.degrees();
  summary.light.description = site.series.description;
  summary.light.is_ceiling = site.series.is_ceiling;
  summary.light.umol_per_joule = site.umol_per_joule;
  const Dome dome = Dome::of(plan.dome.quality);
  summary.dome.sectors = dome.sectors;
  summary.dome.bands = dome.bands;
  for (std::size_t m = 0; m < 12; ++m) {
    const double open = maps.open.beam[m] + maps.open.sky[m];
    summary.open_field.dli_month[m] = open;
    summary.open_field.beam_part_month[m] = open > 0.0 ? maps.open.beam[m] / open : kMissing;
  }
  summary.open_field.dli_year = maps.open.year;
  for (std::size_t p = 0; p < maps.periods.size(); ++p)
    summary.open_field.periods.push_back({maps.periods[p], maps.open.beam[p], maps.open.sky[p]});
  if (maps.open.years.size() > 1) summary.open_field.years = years_of(maps.open);
  if (has_percentiles(maps.open)) summary.open_field.over_years = percentiles_of(maps.open);
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
    plot.over_years = row.over_years;
    summary.plots.push_back(std::move(plot));
  }
  summary.layers.resize(maps.layers.size());
  on_all_cores(jobs, maps.layers.size(), [&](std::size_t i) {
    const MapLayer& layer = maps.layers[i];
    summary.layers[i] = {layer.file_name, layer.description, layer.unit,
                         fingerprint(folder / layer.file_name)};
  });
  for (const auto& [stage, seconds] : maps.seconds) summary.timings_s.emplace_back(stage, seconds);
  summary.notes = site.notes;
  summary.notes.insert(summary.notes.end(), maps.notes.begin(), maps.notes.end());
  for (const std::string& choice : plan.defaults) summary.notes.push_back("Left open in the plan: " + choice);
  summary.notes.push_back(
      fmt::format("The inputs cover {:.1f} % of the horizon (mean of sight.tif).", 100.0 * maps.mean_sight));
  return summary;
}

}  // namespace

std::vector<Plot> plots_of(const Plan& plan, const GridFrame& frame) {
  if (!plan.plots) return {};
  return read_plots({plan.plots->file, plan.plots->layer, plan.plots->id, plan.plots->crop}, frame);
}

void write_run(const Plan& plan, const Site& site, const MapResult& maps, const std::vector<Plot>& plots,
               const std::filesystem::path& folder, const MapOptions& options, Progress& progress) {
  const Stopwatch watch;
  const int jobs = options.jobs;
  const std::size_t periods = maps.periods.size();
  const PlotCells& cells = options.plots;
  std::vector<LayerLight> light(periods + 1);  // the year last
  SharedProgress told(progress, "tables and pictures", periods + 2);
  on_all_cores(jobs, light.size(), [&](std::size_t i) {
    if (progress.stop_requested()) {
      throw Error(ErrorKind::interrupted,
                  {"stopped before the run was done", "", "", "Run the same command again"});
    }
    light[i] =
        read_light(folder / (i < periods ? layer_file(maps.periods[i]) : "dli-year.tif"), maps.frame, cells);
    told.one_done();
  });
  const std::vector<PlotRow> rows = plot_rows(plots, light, maps);
  if (maps.open.years.size() > 1) write_years_csv(folder / "years.csv", maps.open, maps.periods);
  if (!plan.rows.empty() && !maps.crops.empty()) write_rows_csv(folder / "rows.csv", plan, maps);
  LayerLight year = std::move(light.back());

  const MapContext context = context_of(plan, site, plots);
  ContactSheet sheet{context, {}};
  for (std::size_t m = 0; m < 12; ++m) {
    sheet.months.push_back(
        panel_of(month_name(m), std::move(light[m]), maps.open.beam[m] + maps.open.sky[m]));
  }
  draw_contact_sheet(folder / "months.png", sheet);
  draw_map(folder / "year.png",
           {context, "Daily light, mean of the year", panel_of("Year", std::move(year), maps.open.year)});

  RasterStyle style;
  style.scale = shared_scale(sheet.months);
  write_raster_sld(folder / "style-dli.sld", style);
  if (!plots.empty()) {
    std::vector<std::string> names;
    for (const Period& period : maps.periods) names.push_back(period.name);
    names.push_back("year");
    write_plots_csv(folder / "plots.csv", rows, names);
    write_plots_gpkg(folder / "plots.gpkg", plots, plot_columns(rows, names), maps.frame);
  }
  Summary summary = summary_of(plan, site, maps, rows, folder, jobs);
  summary.timings_s.emplace_back("tables and pictures", watch.seconds());
  write_summary(folder / "summary.json", summary);
  told.one_done();
}

}  // namespace sunfall

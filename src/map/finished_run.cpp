#include "map/finished_run.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <fstream>
#include <nlohmann/json.hpp>
#include <optional>

#include "core/fingerprint.h"
#include "core/parallel.h"
#include "geo/layer_writer.h"
#include "map/layers.h"
#include "plan/month_day.h"
#include "sunfall/error.h"
#include "sunfall/version.h"

namespace sunfall {
namespace {

using Json = nlohmann::json;

const std::string kMapAgain = "Make the run again with sunfall map and [output] shares = true";

[[noreturn]] void refuse(const std::string& what, const std::filesystem::path& where,
                         const std::string& found = "", const std::string& remedy = kMapAgain) {
  throw Error(ErrorKind::data, {what, where.string(), found, remedy});
}

// A summary may come from anywhere: every value is looked at before it is used.
class SummaryReader {
 public:
  explicit SummaryReader(const std::filesystem::path& file) : file_(file) {
    std::ifstream in(file);
    json_ = Json::parse(in, nullptr, false);
    if (!json_.is_object()) fail("");
  }
  const Json& json() const { return json_; }
  const Json& member(const Json& of, const char* key) const {
    if (!of.is_object() || !of.contains(key)) fail(key);
    return of[key];
  }
  std::string text(const Json& of, const char* key) const {
    const Json& value = member(of, key);
    if (!value.is_string()) fail(key);
    return value.get<std::string>();
  }
  double number(const Json& of, const char* key) const {
    const Json& value = member(of, key);
    if (!value.is_number()) fail(key);
    return value.get<double>();
  }
  const Json& list(const Json& of, const char* key) const {
    const Json& value = member(of, key);
    if (!value.is_array()) fail(key);
    return value;
  }
  [[noreturn]] void fail(const std::string& key) const {
    refuse("the summary is not one that a run wrote", file_, key.empty() ? "" : "no sound " + key);
  }

 private:
  const std::filesystem::path& file_;
  Json json_;
};

// Period names become file names.
bool is_plain(const std::string& name) {
  return !name.empty() && std::all_of(name.begin(), name.end(), [](char letter) {
    return (letter >= 'a' && letter <= 'z') || (letter >= '0' && letter <= '9') || letter == '-' ||
           letter == '_';
  });
}

Period period_of(const SummaryReader& summary, const Json& json) {
  const std::string name = summary.text(json, "name");
  const auto from = month_day_of(summary.text(json, "from"));
  const auto to = month_day_of(summary.text(json, "to"));
  if (!is_plain(name) || !from || !to) summary.fail("periods");
  return {name, *from, *to};
}

}  // namespace

FinishedRun::FinishedRun(const std::filesystem::path& folder) : folder_((folder / "").parent_path()) {
  const std::filesystem::path file = folder_ / "summary.json";
  std::error_code ignored;
  if (!std::filesystem::is_regular_file(file, ignored)) {
    refuse("there is no finished run in the folder", folder_, "no summary.json",
           "Name the folder that sunfall map wrote, once it is done");
  }
  summary_sha256_ = fingerprint(file).sha256;
  const SummaryReader summary(file);
  const Json& json = summary.json();
  const std::string version = summary.text(json, "version");
  if (version != kVersion)
    refuse("the run was made by another version of sunfall", file, version + ", not " + kVersion);
  plan_name_ = summary.text(json, "plan");
  light_ = summary.text(summary.member(json, "light"), "description");
  for (const auto& [key, value] : summary.member(json, "geometry").items()) {
    if (!value.is_string()) summary.fail("geometry");
    geometry_.emplace_back(key, value.get<std::string>());
  }
  for (const Json& period : summary.list(summary.member(json, "open_field"), "periods")) {
    periods_.push_back(period_of(summary, period));
    open_beam_.push_back(summary.number(period, "beam"));
    open_sky_.push_back(summary.number(period, "sky"));
  }
  if (periods_.size() < 12) summary.fail("periods");

  std::map<std::string, std::string> prints;
  for (const Json& layer : summary.list(json, "layers"))
    prints[summary.text(layer, "file")] = summary.text(layer, "sha256");
  const auto need = [&](const std::string& name) {
    if (!prints.contains(name)) refuse("the run did not write its shares", folder_, "no " + name);
    layers_.push_back({name, prints[name]});
  };
  for (const char* part : {"beam", "sky"}) {
    for (const Period& period : periods_) need(fmt::format("share-{}-{}.tif", part, period.name));
  }
  need("sight.tif");
  for (const Layer& layer : layers_) {
    if (!std::filesystem::is_regular_file(folder_ / layer.file, ignored))
      refuse("a layer of the run is missing", folder_ / layer.file);
  }
  frame_ = layer_frame(folder_ / layers_.back().file);
}

TileAnswer FinishedRun::tile(const CellWindow& window) const {
  const std::size_t cells = static_cast<std::size_t>(window.columns) * window.rows;
  const std::size_t columns = layers_.size() - 1;
  TileAnswer answer;
  answer.shares.window = window;
  answer.shares.columns = static_cast<int>(columns);
  answer.shares.usable.assign(cells, 1);
  answer.shares.shares.resize(cells * columns);
  for (std::size_t c = 0; c < columns; ++c) {
    const Grid<float> layer = read_layer(folder_ / layers_[c].file, window);
    for (std::size_t cell = 0; cell < cells; ++cell) {
      const float share = layer.values()[cell];
      if (std::isnan(share)) answer.shares.usable[cell] = 0;
      answer.shares.shares[cell * columns + c] = share;
    }
  }
  answer.sight = read_layer(folder_ / layers_.back().file, window).values();
  return answer;
}

void FinishedRun::require_geometry(const GeometryRecord& wanted, const std::string& where) const {
  const auto value_in = [](const GeometryRecord& record, const std::string& key) -> std::string {
    for (const auto& [name, value] : record) {
      if (name == key) return value;
    }
    return "none";
  };
  const auto compare = [&](const std::string& key) {
    const std::string now = value_in(wanted, key), then = value_in(geometry_, key);
    if (now == then) return;
    constexpr std::size_t kFew = 60;  // a fingerprint is shortened, words are not
    const auto shortened = [](const std::string& text) {
      return text.size() > kFew && text.find(' ') == std::string::npos ? text.substr(0, 12) + "…" : text;
    };
    throw Error(ErrorKind::plan,
                {"not as it was in the finished run", where + " " + key,
                 fmt::format("{}; in {} it was {}", shortened(now), folder_.string(), shortened(then)),
                 "Only the light may differ: take the change back, or make the map without --on"});
  };
  for (const auto& [key, value] : wanted) compare(key);
  for (const auto& [key, value] : geometry_) compare(key);
}

void FinishedRun::require_light(const OpenField& open) const {
  for (std::size_t p = 0; p < periods_.size(); ++p) {
    const bool unknown_beam = open_beam_[p] <= 0.0 && open.beam[p] > 0.0;
    const bool unknown_sky = open_sky_[p] <= 0.0 && open.sky[p] > 0.0;
    if (!unknown_beam && !unknown_sky) continue;
    refuse(fmt::format("the run's light had no {}, so that its share was never found",
                       unknown_beam ? "beam" : "sky light"),
           folder_, period_title(periods_[p]), "Make the map without --on");
  }
}

void FinishedRun::require_whole_layers(int jobs) const {
  on_all_cores(jobs, layers_.size(), [&](std::size_t i) {
    const std::filesystem::path file = folder_ / layers_[i].file;
    if (fingerprint(file).sha256 != layers_[i].sha256)
      refuse("the layer is not as the run wrote it", file, "another SHA-256 than in summary.json");
  });
}

void FinishedRun::require_unchanged() const {
  std::error_code ignored;
  const std::filesystem::path file = folder_ / "summary.json";
  if (std::filesystem::is_regular_file(file, ignored) && fingerprint(file).sha256 == summary_sha256_) return;
  refuse("another run has written into the folder meanwhile", folder_, "", "Run the same command again");
}

std::string shares_note(const FinishedRun& run) {
  return fmt::format(
      "The shares are those of the finished run in {} (plan {}; light: {}), rounded to 1/4096: where in the "
      "sky "
      "light comes from is as in that light, how much as in this one.",
      run.folder().string(), run.plan_name(), run.light());
}

MapResult make_maps_on(const FinishedRun& run, const Plan& plan, const OpenField& open,
                       const std::map<std::string, std::string>& provenance,
                       const std::filesystem::path& folder, const MapOptions& options, Progress& progress) {
  MapResult result;
  const Stopwatch reading;
  run.require_light(open);
  run.require_whole_layers(options.jobs);
  result.seconds["reading"] = reading.seconds();
  result.frame = run.frame();
  result.periods = run.periods();
  result.open = open;
  result.shares_from = run.folder().string();
  result.notes.push_back(shares_note(run));
  std::map<std::string, std::string> origin = provenance;
  origin["SUNFALL_SHARES"] =
      fmt::format("of a finished run (plan {}; light: {}), rounded to 1/4096", run.plan_name(), run.light());
  Plan without_rows = plan;
  if (!plan.rows.empty()) {
    without_rows.rows.clear();
    result.notes.push_back("What crop rows take is not made from a finished run's shares");
  }
  LayerSet layers(without_rows, origin, folder, result);
  layers.fill([&run](const CellWindow& window) { return run.tile(window); }, "putting the light through",
              options, progress);
  run.require_unchanged();
  layers.finish(options, progress);
  return result;
}

}  // namespace sunfall

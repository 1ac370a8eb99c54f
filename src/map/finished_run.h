#pragma once
// A finished run, opened to be used again: its shares are known, so any weather can be put through them
// without solving geometry.

#include <filesystem>
#include <string>
#include <vector>

#include "map/geometry_record.h"
#include "map/layer_set.h"
#include "sunfall/map.h"

namespace sunfall {

class FinishedRun {
 public:
  // Reads the summary in `folder`. Throws Error(data) where there is none, or one of another version or of
  // no run, and where the run did not write its shares.
  explicit FinishedRun(const std::filesystem::path& folder);

  const std::filesystem::path& folder() const { return folder_; }
  const std::string& plan_name() const { return plan_name_; }
  const std::string& light() const { return light_; }  // its description
  const GridFrame& frame() const { return frame_; }
  const std::vector<Period>& periods() const { return periods_; }
  const GeometryRecord& geometry() const { return geometry_; }

  // Shares as they were written, rounded to 1/4096, and sight; from several threads.
  TileAnswer tile(const CellWindow& window) const;

  // Throws Error(plan) that names the first thing in which `wanted` differs; `where` is the plan's file.
  void require_geometry(const GeometryRecord& wanted, const std::string& where) const;
  // Throws Error(data) where `open` has beam or sky in a period in which the run's light had none: what
  // share of it arrives was never found.
  void require_light(const OpenField& open) const;
  // Throws Error(data) where a layer of shares is not, to the byte, what the summary says.
  void require_whole_layers(int jobs) const;
  // Throws Error(data) where another run has taken the folder since it was opened.
  void require_unchanged() const;

 private:
  struct Layer {
    std::string file;
    std::string sha256;
  };
  std::filesystem::path folder_;
  std::string summary_sha256_;
  std::string plan_name_;
  std::string light_;
  GridFrame frame_;
  std::vector<Period> periods_;
  std::vector<double> open_beam_;  // [period]
  std::vector<double> open_sky_;
  GeometryRecord geometry_;
  std::vector<Layer> layers_;  // beam of every period, sky of every period, sight
};

// The plan's maps with the shares of a finished run and another light, `open`. Throws Error.
MapResult make_maps_on(const FinishedRun& run, const Plan& plan, const OpenField& open,
                       const std::map<std::string, std::string>& provenance,
                       const std::filesystem::path& folder, const MapOptions& options, Progress& progress);

// What a summary says of such maps, and what each layer says.
std::string shares_note(const FinishedRun& run);

}  // namespace sunfall

#include "plan/plots_table.h"

namespace sunfall {
namespace {

const PathKey kFile{"file", ""};
const TextKey kLayer{"layer", std::nullopt, "the file's only layer"};
const TextKey kId{"id", "id", ""};
const TextKey kCrop{"crop", std::nullopt, "none (no crop is named)"};

}  // namespace

TableShape plots_shape() { return {"plots", {kFile, kLayer, kId, kCrop}}; }

void read_plots_table(TableReader& table, Plan& plan) {
  if (!table.given()) {
    table.note_default("file", "none (no table of plots is made)");
    return;
  }
  PlotsPlan plots;
  plots.file = table.path(kFile);
  plots.layer = table.optional_text(kLayer).value_or("");
  plots.id = table.text(kId);
  plots.crop = table.optional_text(kCrop);
  plan.plots = plots;
}

}  // namespace sunfall

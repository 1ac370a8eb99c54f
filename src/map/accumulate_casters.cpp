#include "map/accumulate_casters.h"

#include <algorithm>
#include <cmath>

#include "core/clones.h"
#include "dome/horizon_steps.h"

namespace sunfall {
namespace {

// 1 - e^-depth in 1/32768, for depths of four units each.
constexpr int kDepthShift = 2;
const std::vector<std::uint16_t>& taken_table() {
  static const std::vector<std::uint16_t> table = [] {
    std::vector<std::uint16_t> out((std::size_t{65536} >> kDepthShift) + 1);
    for (std::size_t i = 0; i < out.size(); ++i) {
      const double depth = double(i << kDepthShift) / kDepthUnits;
      out[i] = static_cast<std::uint16_t>(std::lround(-32767.0 * std::expm1(-depth)));
    }
    return out;
  }();
  return table;
}

// Cells of a row whose sums stay in the first cache while looks and bands pass.
constexpr int kChunk = 128;

inline __attribute__((always_inline)) bool untouched(const DepthPlanes& planes, std::size_t first,
                                                     int count) {
  unsigned any = 0;
  for (const Depth* depth : planes.groups) {
    for (int i = 0; i < count; ++i) any |= depth[first + static_cast<std::size_t>(i)];
  }
  return any == 0;
}

// What is taken in each state, from the depths of the groups at one cell.
inline __attribute__((always_inline)) bool taken_by_state(const DepthPlanes& planes, std::size_t cell,
                                                          const CasterTables& tables,
                                                          const std::uint16_t* table, std::uint16_t* taken) {
  unsigned any = 0;
  for (const Depth* depth : planes.groups) any |= depth[cell];
  if (any == 0) return false;
  for (int state = 0; state < tables.states(); ++state) {
    const std::uint32_t* leaf = tables.leaf_of(state);
    std::uint32_t depth = 0;
    for (std::size_t g = 0; g < planes.groups.size(); ++g) depth += leaf[g] * planes.groups[g][cell];
    taken[state] =
        table[std::min<std::uint32_t>((depth >> 8) + (1 << (kDepthShift - 1)), 65536) >> kDepthShift];
  }
  return true;
}

inline __attribute__((always_inline)) void add_band(const std::uint16_t* below, const std::uint16_t* low,
                                                    const std::uint16_t* high, const std::uint16_t* taken,
                                                    std::uint32_t* sums) {
  for (int c = 0; c < kColumnBlock; ++c) {
    const int from = std::max<int>(low[c], below[c]);
    const int light = std::max<int>(high[c] - from, 0);
    sums[c] += static_cast<std::uint32_t>((light * taken[c] + (1 << 14)) >> 15);
  }
}

}  // namespace

SUNFALL_CLONES void accumulate_casters(const CasterBatch& batch, const CasterTables& tables,
                                       const LossTable& level, int block, std::uint32_t* sums) {
  const std::uint16_t* const table = taken_table().data();
  const std::uint16_t* const state_of = tables.state_of_column().data() + block * kColumnBlock;
  std::vector<std::uint16_t> by_state(static_cast<std::size_t>(tables.states()));
  std::uint16_t taken[kColumnBlock];
  const std::size_t right = batch.by_columns ? static_cast<std::size_t>(batch.rows) : 1;
  const std::size_t down = batch.by_columns ? 1 : static_cast<std::size_t>(batch.columns);
  for (int row = 0; row < batch.rows; ++row) {
    for (int column = 0; column < batch.columns; column += kChunk) {
      const int count = std::min(kChunk, batch.columns - column);
      const std::size_t first = static_cast<std::size_t>(row) * batch.columns + column;
      for (const CasterLook& look : batch.looks) {
        const std::uint16_t* steps =
            look.steps + static_cast<std::size_t>(row) * down + static_cast<std::size_t>(column) * right;
        const std::uint16_t* const below = level.look(look.look, block);
        const std::uint16_t* const edges = tables.edges(look.look, block);
        for (const DepthPlanes& planes : look.bands) {
          if (untouched(planes, first, count)) continue;
          const std::uint16_t* const low = edges + static_cast<std::size_t>(planes.band) * kColumnBlock;
          for (int i = 0; i < count; ++i) {
            const std::size_t cell = first + static_cast<std::size_t>(i);
            if (!taken_by_state(planes, cell, tables, table, by_state.data())) continue;
            for (int c = 0; c < kColumnBlock; ++c) taken[c] = by_state[state_of[c]];
            add_band(
                below + static_cast<std::size_t>(steps[static_cast<std::size_t>(i) * right]) * kColumnBlock,
                low, low + kColumnBlock, taken, sums + cell * kColumnBlock);
          }
        }
      }
    }
  }
}

namespace {

// What passes the casters that are no crops, by state.
inline void passed_by_state(const DepthPlanes& planes, std::size_t cell, const CasterTables& tables,
                            const std::uint16_t* table, float* passed) {
  for (int state = 0; state < tables.states(); ++state) {
    const std::uint32_t* leaf = tables.leaf_of(state);
    std::uint32_t depth = 0;
    for (std::size_t g = 0; g < planes.groups.size(); ++g) {
      if (!tables.of_crops(static_cast<int>(g))) depth += leaf[g] * planes.groups[g][cell];
    }
    const std::uint32_t read = std::min<std::uint32_t>((depth >> 8) + (1 << (kDepthShift - 1)), 65536);
    passed[state] = 1.0F - static_cast<float>(table[read >> kDepthShift]) * (1.0F / 32767.0F);
  }
}

// The light of a band above the horizon, a column's share of the open field's.
inline float band_light(const CasterTables& tables, const LossTable& level, std::size_t look, int band,
                        std::size_t step, int column) {
  const int block = column / kColumnBlock, at = column % kColumnBlock;
  const std::uint16_t* low = tables.edges(look, block) + static_cast<std::size_t>(band) * kColumnBlock + at;
  const int below = level.look(look, block)[step * kColumnBlock + static_cast<std::size_t>(at)];
  return static_cast<float>(std::max(low[kColumnBlock] - std::max<int>(low[0], below), 0)) *
         static_cast<float>(level.units()[static_cast<std::size_t>(column)]);
}

// Whether no caster but crops stands before the cell.
bool stands_alone(const CasterLook& look, std::size_t cell, const CasterTables& tables) {
  unsigned any = 0;
  for (const DepthPlanes& planes : look.bands) {
    for (std::size_t g = 0; g < planes.groups.size(); ++g) {
      if (!tables.of_crops(static_cast<int>(g))) any |= planes.groups[g][cell];
    }
  }
  return any == 0;
}

// What a crop takes from one look above each horizon step that is met, where nothing else stands before it.
class TakenAbove {
 public:
  TakenAbove(const CasterLook& look, std::size_t crop, const CasterTables& tables, const LossTable& level)
      : look_(look), crop_(crop), tables_(tables), level_(level), rows_(kHorizonSteps) {}
  // [right, left, came][columns]
  const std::vector<float>& row(std::size_t step) {
    std::vector<float>& row = rows_[step];
    if (!row.empty()) return row;
    const std::size_t columns = static_cast<std::size_t>(level_.columns());
    row.assign(3 * columns, 0.0F);
    for (const DepthPlanes& planes : look_.bands) {
      const CropTaken* taken = planes.crops.data() + crop_ * static_cast<std::size_t>(tables_.states());
      for (std::size_t c = 0; c < columns; ++c) {
        const float light = band_light(tables_, level_, look_.look, planes.band, step, static_cast<int>(c));
        const CropTaken& of_state = taken[tables_.state_of_column()[c]];
        row[c] += light * of_state.right;
        row[columns + c] += light * of_state.left;
        row[2 * columns + c] += light * of_state.leafed;
      }
    }
    return row;
  }

 private:
  const CasterLook& look_;
  std::size_t crop_;
  const CasterTables& tables_;
  const LossTable& level_;
  std::vector<std::vector<float>> rows_;
};

}  // namespace

void accumulate_crops(const CasterBatch& batch, const CasterTables& tables, const LossTable& level,
                      TileCrops& crops) {
  const std::uint16_t* const table = taken_table().data();
  const std::size_t columns = static_cast<std::size_t>(crops.columns);
  std::vector<float> passed(static_cast<std::size_t>(tables.states()));
  for (std::size_t i = 0; i < crops.crops.size(); ++i) {
    const TileCrops::Crop& crop = crops.crops[i];
    for (const CasterLook& look : batch.looks) {
      TakenAbove alone(look, i, tables, level);
      const bool others = std::any_of(look.bands.begin(), look.bands.end(),
                                      [](const DepthPlanes& planes) { return planes.others; });
      for (std::size_t k = 0; k < crop.cells.size(); ++k) {
        const std::size_t cell = crop.cells[k];
        const std::size_t row = cell / static_cast<std::size_t>(batch.columns),
                          column = cell % static_cast<std::size_t>(batch.columns);
        const std::size_t step =
            look.steps[batch.by_columns ? column * static_cast<std::size_t>(batch.rows) + row : cell];
        float* const taken = crops.taken.data() + crop.slots[k] * 2 * columns;
        float* const came = crops.came.data() + crop.slots[k] * columns;
        if (!others || stands_alone(look, cell, tables)) {
          const std::vector<float>& above = alone.row(step);
          for (std::size_t c = 0; c < 2 * columns; ++c) taken[c] += above[c];
          for (std::size_t c = 0; c < columns; ++c) came[c] += above[2 * columns + c];
          continue;
        }
        for (const DepthPlanes& planes : look.bands) {
          passed_by_state(planes, cell, tables, table, passed.data());
          const CropTaken* by_state = planes.crops.data() + i * static_cast<std::size_t>(tables.states());
          for (std::size_t c = 0; c < columns; ++c) {
            const std::size_t state = tables.state_of_column()[c];
            const float light =
                passed[state] * band_light(tables, level, look.look, planes.band, step, static_cast<int>(c));
            taken[c] += light * by_state[state].right;
            taken[columns + c] += light * by_state[state].left;
            came[c] += light * by_state[state].leafed;
          }
        }
      }
    }
  }
}

SUNFALL_CLONES void accumulate_casters_on_slope(const CasterBatch& batch, const CasterTables& tables,
                                                const SlopeTables& slope, std::size_t first_look,
                                                float* sums) {
  const std::uint16_t* const table = taken_table().data();
  std::vector<std::uint16_t> by_state(static_cast<std::size_t>(tables.states()));
  const int width = slope.width;
  for (int row = 0; row < batch.rows; ++row) {
    for (int column = 0; column < batch.columns; ++column) {
      const std::size_t cell = static_cast<std::size_t>(row) * batch.columns + column;
      const std::size_t place = batch.by_columns ? static_cast<std::size_t>(column) * batch.rows + row : cell;
      for (const CasterLook& look : batch.looks) {
        const std::size_t line = look.look - first_look;
        const float rise = slope.rise_east[cell] * slope.towards_east[line] +
                           slope.rise_north[cell] * slope.towards_north[line];
        const int step = std::max<int>(look.steps[place], horizon_step(rise));
        const float* below = slope.tables[line] + static_cast<std::size_t>(step) * 2 * width;
        for (const DepthPlanes& planes : look.bands) {
          if (!taken_by_state(planes, cell, tables, table, by_state.data())) continue;
          const float* low =
              tables.slope_edges(look.look) + static_cast<std::size_t>(planes.band) * 2 * width;
          const float* high = low + 2 * width;
          for (int c = 0; c < width; ++c) {
            const float level = high[c] - std::max(low[c], below[c]);
            if (level <= 0.0F) continue;
            const float facing = high[width + c] - std::max(low[width + c], below[width + c]);
            const float taken = static_cast<float>(by_state[tables.state_of_column()[c]]) * (1.0F / 32767.0F);
            sums[cell * width + c] += taken * std::max(0.0F, level - rise * facing);
          }
        }
      }
    }
  }
}

}  // namespace sunfall

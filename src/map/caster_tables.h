#pragma once
// What porous casters need of the dome: the light between the edges of bands, in the units of the loss
// tables, and the states of leaf of the periods.

#include <cstdint>
#include <memory>
#include <span>
#include <vector>

#include "map/loss_table.h"
#include "shade/caster.h"
#include "sunfall/dome.h"

namespace sunfall {

using Casters = std::vector<std::unique_ptr<Caster>>;

// Bands of elevation that one ray each stands for: the dome's own, in pairs where they are finer than
// shade from leaves asks for.
struct CasterBand {
  int first_step = 0;  // of the dome
  int end_step = 0;
  float tangent = 0.0F;  // of the ray, at the middle of the band's sine
};
std::vector<CasterBand> caster_bands(const Dome& dome);

// Looks whose depths are kept at a time: fewer where there are many groups, so that these do not fill memory.
constexpr std::size_t caster_looks(int groups) {
  return groups < 4 ? 4 / static_cast<std::size_t>(groups < 1 ? 1 : groups) : 1;
}

class CasterTables {
 public:
  CasterTables(const DomeLight& light, const std::vector<Look>& looks, const LossTable& level,
               const SlopeLossTable* slope, const Casters& casters);

  const std::vector<CasterBand>& bands() const { return bands_; }

  // Casters with the same leafing form a group and add up to one depth; crops have groups of their own.
  int groups() const { return groups_; }
  static int groups_of(const Casters& casters);
  bool of_crops(int group) const { return of_crops_[group]; }
  int group_of(std::size_t caster) const { return group_of_[caster]; }

  // Periods with the same leaves in every group form a state. Share of full leaf, in 1/256:
  // [state][group].
  int states() const { return states_; }
  const std::uint32_t* leaf_of(int state) const {
    return leaf_.data() + static_cast<std::size_t>(state) * groups_;
  }
  // [padded columns]
  const std::vector<std::uint16_t>& state_of_column() const { return state_of_column_; }

  // Light of a look below each edge of the bands: [bands + 1][kColumnBlock], as LossTable::look.
  const std::uint16_t* edges(std::size_t look, int block) const {
    return edges_.data() +
           (static_cast<std::size_t>(block) * looks_ + look) * (bands_.size() + 1) * kColumnBlock;
  }
  // For receivers in the plane of the ground: [bands + 1][2][padded], as SlopeLossTable::look.
  const float* slope_edges(std::size_t look) const {
    return slope_edges_.data() + look * (bands_.size() + 1) * 2 * slope_padded_;
  }

 private:
  void find_states(const DomeLight& light, const Casters& casters, int columns);

  std::size_t looks_;
  std::vector<CasterBand> bands_;
  int groups_ = 0;
  std::vector<int> group_of_;
  std::vector<bool> of_crops_;
  int states_ = 0;
  std::vector<std::uint32_t> leaf_;
  std::vector<std::uint16_t> state_of_column_;
  AlignedVector<std::uint16_t> edges_;
  int slope_padded_ = 0;
  std::vector<float> slope_edges_;
};

}  // namespace sunfall

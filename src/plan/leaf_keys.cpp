#include "plan/leaf_keys.h"

namespace sunfall {
namespace {

// Bounds are those of CropRows.
const NumberKey kLeafAngle{"leaf_angle", {0.1, 10.0, "", ""}, 1.0};
const NumberKey kClumping{"clumping", {0.05, 1.0, "", ""}, 1.0};
const NumberKey kAbsorptance{"absorptance", {0.05, 1.0, "", ""}, 0.85};
const Bounds kShare{0.0, 1.0, "", "Write each month's share of the full leaf"};
const MonthsKey kLeafing{"leafing", kShare, false, "1 all year"};

}  // namespace

Bounds leaf_density_bounds() {
  return {0.0, 20.0, "m2 m-3",
          "It is the area of one side of the leaves in a cubic metre; dense hedges have about 5"};
}

std::vector<KeyNote> with_leaf_keys(std::vector<KeyNote> keys) {
  for (const KeyNote& note :
       {KeyNote(kLeafAngle), KeyNote(kClumping), KeyNote(kAbsorptance), KeyNote(kLeafing)})
    keys.push_back(note);
  return keys;
}

LeafKeys read_leaf_keys(TableReader& table) {
  LeafKeys leaves;
  leaves.leaf_angle = table.number(kLeafAngle);
  leaves.clumping = table.number(kClumping);
  leaves.absorptance = table.number(kAbsorptance);
  if (const auto months = table.months_if_given(kLeafing)) {
    leaves.leafing = *months;
  } else {
    table.note_default(kLeafing.name, kLeafing.fallback);
  }
  return leaves;
}

}  // namespace sunfall

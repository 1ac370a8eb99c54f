#include "plots.h"

namespace alder_reach {

std::vector<FarmPlot> farm_plots() {
  return {
      // In the open by the river.
      {"P1", "River Field", "lettuce", {{108, 396}, {232, 393}, {232, 540}, {104, 540}}},
      {"P2", "Long Lands", "potato", {{254, 398}, {328, 398}, {330, 560}, {254, 560}}},
      {"P3", "Pear Piece", "pear", {{118, 222}, {234, 214}, {234, 366}, {110, 372}}},
      {"P4", "Ditch Field", "strawberry", {{252, 214}, {368, 212}, {370, 300}, {366, 308}, {252, 308}}},
      // Below the hill and on it.
      {"P5", "Hill Foot", "rhubarb", {{322, 92}, {505, 148}, {496, 177}, {400, 190}, {316, 150}}},
      {"P6", "North Bank", "raspberry", {{540, 100}, {665, 150}, {650, 186}, {525, 136}}},
      // Beside the yard, behind the barn.
      {"P7", "Barn Back", "shade nursery", {{402, 369}, {427, 371.5}, {427, 385}, {401, 383}}},
      // Inside the walls, and on both sides of the hedge.
      {"P8", "Walled Garden", "tomato", {{506, 427}, {549, 432}, {545, 465}, {501, 459}}},
      {"P9", "Hedge South", "strawberry", {{574, 455}, {706, 462}, {703, 502}, {574, 489}}},
      {"P10", "Hedge North", "lettuce", {{570, 495}, {708, 508}, {706, 536}, {568, 524}}},
  };
}

}  // namespace alder_reach

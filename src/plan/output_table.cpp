#include "plan/output_table.h"

namespace sunfall {
namespace {

const FlagKey kShares{"shares", false, ""};
const FlagKey kPercentiles{"percentiles", false, ""};

}  // namespace

TableShape output_shape() { return {"output", {kShares, kPercentiles}}; }

void read_output_table(TableReader& table, Plan& plan) {
  plan.output.shares = table.flag(kShares);
  plan.output.percentiles = table.flag(kPercentiles);
  plan.output.percentiles_where = table.where(kPercentiles.name);
}

}  // namespace sunfall

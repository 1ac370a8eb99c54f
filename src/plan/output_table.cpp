#include "plan/output_table.h"

namespace sunfall {
namespace {

const FlagKey kShares{"shares", false, ""};

}  // namespace

TableShape output_shape() { return {"output", {kShares}}; }

void read_output_table(TableReader& table, Plan& plan) { plan.output.shares = table.flag(kShares); }

}  // namespace sunfall

#include "plan/plan_table.h"

namespace sunfall {
namespace {

const TextKey kName{"name", std::nullopt, "the file's name"};

}  // namespace

TableShape plan_shape() { return {"plan", {kName}}; }

void read_plan_table(TableReader& table, Plan& plan) {
  plan.name = table.optional_text(kName).value_or(plan.file.stem().string());
}

}  // namespace sunfall

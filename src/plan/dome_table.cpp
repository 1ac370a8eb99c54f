#include "plan/dome_table.h"

namespace sunfall {
namespace {

const ChoiceKey<DomeQuality> kQuality{
    "quality",
    {{"draft", DomeQuality::draft}, {"standard", DomeQuality::standard}, {"fine", DomeQuality::fine}},
    DomeQuality::standard};
const ChoiceKey<SkyModel> kSky{"sky",
                               {{"clearness", SkyModel::clearness},
                                {"isotropic", SkyModel::isotropic},
                                {"overcast", SkyModel::overcast}},
                               SkyModel::clearness};

}  // namespace

TableShape dome_shape() { return {"dome", {kQuality, kSky}}; }

void read_dome_table(TableReader& table, Plan& plan) {
  plan.dome.quality = table.choice(kQuality);
  plan.dome.sky = table.choice(kSky);
}

}  // namespace sunfall

#include "plan/site_table.h"

#include <regex>

#include "plan/words.h"

namespace sunfall {
namespace {

const PathKey kGround{"ground", ""};
const PathKey kSurface{"surface", "none (nothing solid stands on the ground)"};
const PathKey kFarGround{"far_ground", "none (the horizon beyond the ground's edge is not known)"};
const NumberKey kReceiverHeight{
    "receiver_height", {0.0, 50.0, "m", "Heights are metres above the ground"}, 0.5};
const ChoiceKey<ReceiverPlane> kReceiverPlane{
    "receiver_plane",
    {{"level", ReceiverPlane::level}, {"ground", ReceiverPlane::ground}},
    ReceiverPlane::level};
const TextKey kClock{"clock", std::nullopt, ""};

// "CET", "CEST", "EST5EDT". The zone database knows some of them, but they mean several places at
// once (IST, CST), name daylight saving time, or lack the place's own history.
bool is_abbreviation(const std::string& clock) {
  static const std::regex form("[A-Z]{3,5}([0-9]{1,2}[A-Z]{0,5})?");
  return clock != "UTC" && clock != "GMT" && std::regex_match(clock, form);
}

Clock read_clock(TableReader& table) {
  const std::string name = table.text(kClock);
  if (is_abbreviation(name)) {
    table.refuse(kClock.name, "the clock is an abbreviation, which is ambiguous", in_quotes(name),
                 "Write a zone such as \"Europe/Amsterdam\", or the offset of standard time, without "
                 "daylight saving, such as \"+01:00\"");
  }
  return Clock::parse(name, table.where(kClock.name));
}

}  // namespace

TableShape site_shape() {
  return {"site", {kGround, kSurface, kFarGround, kReceiverHeight, kReceiverPlane, kClock}};
}

void read_site_table(TableReader& table, Plan& plan) {
  SitePlan& site = plan.site;
  site.ground = table.path(kGround);
  site.surface = table.optional_path(kSurface);
  site.far_ground = table.optional_path(kFarGround);
  site.receiver_height_m = table.number(kReceiverHeight);
  site.receiver_plane = table.choice(kReceiverPlane);
  site.clock = read_clock(table);
}

}  // namespace sunfall

#include "app/memory.h"

#include <fmt/format.h>
#include <sys/resource.h>
#include <unistd.h>

#include <algorithm>
#include <cmath>
#include <fstream>
#include <string>

#include "geo/raster_source.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

constexpr double kBytesPerMebibyte = 1048576.0;

double machine_bytes() {
  const long pages = sysconf(_SC_PHYS_PAGES), page_bytes = sysconf(_SC_PAGE_SIZE);
  return pages > 0 && page_bytes > 0 ? double(pages) * double(page_bytes) : HUGE_VAL;
}

// "max" stands for no limit, and reads as none.
double control_group_bytes(const char* file) {
  std::ifstream in(file);
  double bytes = 0.0;
  return in >> bytes ? bytes : HUGE_VAL;
}

double shell_bytes() {
  rlimit limit{};
  if (getrlimit(RLIMIT_AS, &limit) != 0 || limit.rlim_cur == RLIM_INFINITY) return HUGE_VAL;
  return double(limit.rlim_cur);
}

}  // namespace

double memory_limit_bytes() {
  return std::min({machine_bytes(), control_group_bytes("/sys/fs/cgroup/memory.max"),
                   control_group_bytes("/sys/fs/cgroup/memory/memory.limit_in_bytes"), shell_bytes()});
}

void require_memory_for(const Plan& plan) {
  const RasterSource ground = RasterSource::open(plan.site.ground, "ground");
  const GridFrame& frame = ground.frame();
  const double needed = kBytesPerMapCell * double(frame.columns) * double(frame.rows);
  const double limit = memory_limit_bytes();
  if (needed <= limit) return;
  throw Error(
      ErrorKind::data,
      {"the raster is too large for this machine's memory", plan.site.ground.string() + " (ground)",
       fmt::format("{} x {} cells, which need {:.0f} MiB of {:.0f}", frame.columns, frame.rows,
                   needed / kBytesPerMebibyte, limit / kBytesPerMebibyte),
       "Cut out the part that you need: gdal_translate -projwin WEST NORTH EAST SOUTH IN.tif OUT.tif"});
}

}  // namespace sunfall

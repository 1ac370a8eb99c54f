#include "oracle/ray_surface.h"

#include <algorithm>
#include <cmath>
#include <numbers>

#include "shade/horizon_kernel.h"

namespace sunfall::oracle {
namespace {

constexpr int kMargin = 64;    // map cells around the map at full resolution
constexpr int kFarLevel = 4;   // cells of 16 map cells beyond
constexpr int kHalvings = 14;  // 90 degrees / 2^14 = 0.0055

// The same bend as the sweep's: distance² · (1 - refraction) / (2 · radius).
constexpr double kBend_per_m = (1.0 - 0.13) / (2.0 * 6'371'000.0);

struct Triangle {
  unsigned a, b, c;
};

CellWindow grown(const CellWindow& window, int margin) {
  return {window.column - margin, window.row - margin, window.columns + 2 * margin, window.rows + 2 * margin};
}

// Cells of a level that cover a window of map cells, one more all round.
CellWindow at_level(const CellWindow& map, int level) {
  const double size = 1 << level;
  const int west = static_cast<int>(std::floor(map.column / size)) - 1;
  const int north = static_cast<int>(std::floor(map.row / size)) - 1;
  const int east = static_cast<int>(std::ceil((map.column + map.columns) / size)) + 1;
  const int south = static_cast<int>(std::ceil((map.row + map.rows) / size)) + 1;
  return {west, north, east - west, south - north};
}

}  // namespace

float RayHorizon::at(double turn) const {
  const double place = turn * static_cast<double>(elevation.size());
  const auto first = static_cast<std::size_t>(place) % elevation.size();
  const std::size_t second = first + 1 < elevation.size() ? first + 1 : 0;
  const auto part = static_cast<float>(place - std::floor(place));
  return elevation[first] + part * (elevation[second] - elevation[first]);
}

RayDirection RayDirection::of(double azimuth, double elevation) {
  return {std::sin(azimuth), std::cos(azimuth), std::cos(elevation), std::sin(elevation)};
}

RaySurface::RaySurface(const Terrain& terrain, Diagonal diagonal)
    : frame_(terrain.frame()), device_(rtcNewDevice(nullptr)), scene_(rtcNewScene(device_)) {
  rtcSetSceneFlags(scene_, RTC_SCENE_FLAG_ROBUST);
  rtcSetSceneBuildQuality(scene_, RTC_BUILD_QUALITY_HIGH);
  const CellWindow map{0, 0, frame_.columns, frame_.rows};
  add(terrain, terrain.level_grid(0, grown(map, kMargin)), nullptr, diagonal);
  const CellWindow known = terrain.known_box();
  if (!(known == map)) {
    // Coarse cells that touch the map keep its highest corner: the full resolution stands for them.
    const CellWindow hole = grown(map, kMargin - (2 << kFarLevel));
    add(terrain, terrain.level_grid(kFarLevel, at_level(known, kFarLevel)), &hole, diagonal);
  }
  rtcCommitScene(scene_);
}

RaySurface::~RaySurface() {
  rtcReleaseScene(scene_);
  rtcReleaseDevice(device_);
}

// Corners inside `hole` (map cells) and unknown ones leave their triangles out. The Earth is bent away
// from the middle of the map.
void RaySurface::add(const Terrain& terrain, const LevelGrid& grid, const CellWindow* hole,
                     Diagonal diagonal) {
  const double cell_m = terrain.frame().cell_m, size = 1 << grid.level;
  const int columns = grid.window.columns, rows = grid.window.rows;
  const MapPoint middle{0.5 * frame_.columns, 0.5 * frame_.rows};
  RTCGeometry geometry = rtcNewGeometry(device_, RTC_GEOMETRY_TYPE_TRIANGLE);
  auto* vertex = static_cast<float*>(rtcSetNewGeometryBuffer(geometry, RTC_BUFFER_TYPE_VERTEX, 0,
                                                             RTC_FORMAT_FLOAT3, 3 * sizeof(float),
                                                             static_cast<std::size_t>(columns) * rows));
  std::vector<char> solid(static_cast<std::size_t>(columns) * rows);
  for (int row = 0; row < rows; ++row) {
    for (int column = 0; column < columns; ++column) {
      const std::size_t at = static_cast<std::size_t>(row) * columns + column;
      const double map_column = (grid.window.column + column + 0.5) * size;
      const double map_row = (grid.window.row + row + 0.5) * size;
      const double east = (map_column - middle.east) * cell_m, north = (middle.north - map_row) * cell_m;
      const float height = grid.heights[at];
      const bool in_hole = hole != nullptr && map_column > hole->column && map_row > hole->row &&
                           map_column < hole->column + hole->columns && map_row < hole->row + hole->rows;
      solid[at] = height != kNothing && !in_hole;
      vertex[3 * at] = static_cast<float>(east);
      vertex[3 * at + 1] = static_cast<float>(north);
      vertex[3 * at + 2] =
          solid[at] ? static_cast<float>(height - kBend_per_m * (east * east + north * north)) : 0.0F;
    }
  }
  std::vector<Triangle> triangles;
  const auto keep = [&](unsigned a, unsigned b, unsigned c) {
    if (solid[a] && solid[b] && solid[c]) triangles.push_back({a, b, c});
  };
  for (int row = 0; row + 1 < rows; ++row) {
    for (int column = 0; column + 1 < columns; ++column) {
      const unsigned nw = static_cast<unsigned>(row) * columns + column, ne = nw + 1;
      const unsigned sw = nw + columns, se = sw + 1;
      if (diagonal == Diagonal::falling) {
        keep(nw, sw, se);
        keep(nw, se, ne);
      } else {
        keep(sw, se, ne);
        keep(sw, ne, nw);
      }
    }
  }
  auto* index = static_cast<Triangle*>(rtcSetNewGeometryBuffer(
      geometry, RTC_BUFFER_TYPE_INDEX, 0, RTC_FORMAT_UINT3, sizeof(Triangle), triangles.size()));
  std::copy(triangles.begin(), triangles.end(), index);
  rtcCommitGeometry(geometry);
  rtcAttachGeometry(scene_, geometry);
  rtcReleaseGeometry(geometry);
}

RayEye RaySurface::eye(CellIndex cell, double height_m) const {
  const double east = (cell.column + 0.5 - 0.5 * frame_.columns) * frame_.cell_m;
  const double north = (0.5 * frame_.rows - cell.row - 0.5) * frame_.cell_m;
  return {east, north, height_m - kBend_per_m * (east * east + north * north)};
}

std::uint32_t RaySurface::hidden(const RayPacket& packet, std::uint32_t wanted) const {
  RTCRay16 ray{};
  alignas(64) int valid[kPacket];
  for (int i = 0; i < kPacket; ++i) {
    const RayEye& eye = packet.eyes[i];
    const RayDirection& direction = packet.directions[i];
    // Level at the receiver is tangent to the bent ground there.
    const double lean = -2.0 * kBend_per_m * (eye.east * direction.to_east + eye.north * direction.to_north);
    valid[i] = (wanted >> i & 1U) != 0 ? -1 : 0;
    ray.org_x[i] = static_cast<float>(eye.east);
    ray.org_y[i] = static_cast<float>(eye.north);
    ray.org_z[i] = static_cast<float>(eye.up);
    ray.dir_x[i] = static_cast<float>(direction.level * direction.to_east);
    ray.dir_y[i] = static_cast<float>(direction.level * direction.to_north);
    ray.dir_z[i] = static_cast<float>(direction.rise + direction.level * lean);
    ray.tnear[i] = 0.0F;
    ray.tfar[i] = 1.0e6F;
    ray.mask[i] = ~0U;
  }
  RTCIntersectContext context;
  rtcInitIntersectContext(&context);
  context.flags = RTC_INTERSECT_CONTEXT_FLAG_COHERENT;
  rtcOccluded16(valid, scene_, &context, &ray);
  std::uint32_t hidden = 0;
  for (int i = 0; i < kPacket; ++i) hidden |= static_cast<std::uint32_t>(ray.tfar[i] < 0.0F) << i;
  return hidden & wanted;
}

RayHorizon RaySurface::horizon(CellIndex cell, double height_m, int azimuths) const {
  RayPacket packet;
  std::fill_n(packet.eyes, kPacket, eye(cell, height_m));
  RayHorizon out;
  out.elevation.resize(azimuths);
  for (int first = 0; first < azimuths; first += kPacket) {
    const int count = std::min(kPacket, azimuths - first);
    std::uint32_t wanted = (1U << count) - 1U;
    double azimuth[kPacket], low[kPacket], high[kPacket];
    for (int i = 0; i < kPacket; ++i) {
      azimuth[i] = 2.0 * std::numbers::pi * (first + i) / azimuths;
      low[i] = 0.0;
      high[i] = 0.5 * std::numbers::pi;
    }
    for (int look = 0; look <= kHalvings && wanted != 0; ++look) {
      const bool level = look == 0;  // the first look is level: most of open country ends there
      double elevation[kPacket];
      for (int i = 0; i < kPacket; ++i) {
        elevation[i] = level ? 0.0 : 0.5 * (low[i] + high[i]);
        packet.directions[i] = RayDirection::of(azimuth[i], elevation[i]);
      }
      const std::uint32_t hidden_now = hidden(packet, wanted);
      for (int i = 0; i < count; ++i) {
        if ((wanted >> i & 1U) != 0) ((hidden_now >> i & 1U) != 0 ? low : high)[i] = elevation[i];
      }
      if (level) wanted = hidden_now;
    }
    for (int i = 0; i < count; ++i) out.elevation[first + i] = static_cast<float>(0.5 * (low[i] + high[i]));
  }
  return out;
}

}  // namespace sunfall::oracle

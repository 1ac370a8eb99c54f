#include "bench/country.h"

#include <fmt/format.h>
#include <tbb/parallel_for.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <cstdint>
#include <fstream>
#include <numbers>

#include "geo/geodesy.h"
#include "geo/layer_writer.h"

namespace sunfall::bench {
namespace {

constexpr int kStripRows = 256;
constexpr int kUtmZone31 = 25831;

// The plan's light is that of the demo farm: invented, but such as is met near 52 degrees north.
constexpr const char* kPlan = R"([plan]
name = "Invented country"

[site]
ground = "ground.tif"
surface = "surface.tif"
receiver_height = 0.5
clock = "+01:00"

[light]
monthly_global = [2.2, 4.1, 8.0, 13.2, 17.0, 18.1, 17.4, 14.9, 10.3, 5.9, 2.9, 1.8]
)";

// Random bits that belong to a place and a purpose: a 64-bit finaliser of odd multipliers and shifts.
std::uint64_t bits_at(int column, int row, std::uint64_t purpose) {
  std::uint64_t mark =
      (std::uint64_t(std::uint32_t(column)) << 32U | std::uint32_t(row)) + purpose * 0x9E3779B97F4A7C15ULL;
  mark = (mark ^ (mark >> 30U)) * 0xBF58476D1CE4E5B9ULL;
  mark = (mark ^ (mark >> 27U)) * 0x94D049BB133111EBULL;
  return mark ^ (mark >> 31U);
}
// A part of those bits as a number in [0, 1).
double part(std::uint64_t bits, int which) { return double(bits >> (12 * which) & 0xFFFU) / 4096.0; }

struct Wave {
  double height_m, length_m, azimuth_deg, phase;
};
constexpr std::array<Wave, 7> kHills = {{{34.0, 2700.0, 20.0, 0.3},
                                         {22.0, 1900.0, 115.0, 1.9},
                                         {11.0, 730.0, 65.0, 4.1},
                                         {7.0, 510.0, 160.0, 2.2},
                                         {2.5, 190.0, 95.0, 0.9},
                                         {1.5, 140.0, 10.0, 5.0},
                                         {0.4, 37.0, 130.0, 3.3}}};

// Sines of sums from sines and cosines, so that a cell costs no call.
struct WaveTables {
  std::vector<double> sine, cosine;  // [column][wave]
  explicit WaveTables(int columns) : sine(columns * kHills.size()), cosine(columns * kHills.size()) {
    for (int column = 0; column < columns; ++column) {
      for (std::size_t w = 0; w < kHills.size(); ++w) {
        const double angle = per_column(kHills[w]) * column;
        sine[column * kHills.size() + w] = std::sin(angle);
        cosine[column * kHills.size() + w] = std::cos(angle);
      }
    }
  }
  static double per_column(const Wave& wave) {
    return 2.0 * std::numbers::pi / wave.length_m * std::sin(wave.azimuth_deg * std::numbers::pi / 180.0);
  }
  static double per_row(const Wave& wave) {
    return 2.0 * std::numbers::pi / wave.length_m * std::cos(wave.azimuth_deg * std::numbers::pi / 180.0);
  }
};

// Bare ground of one row: hills, and the roughness that survey heights have.
void ground_row(const WaveTables& tables, int row, int columns, float* out) {
  std::array<double, kHills.size()> sine{}, cosine{};
  for (std::size_t w = 0; w < kHills.size(); ++w) {
    const double angle = WaveTables::per_row(kHills[w]) * row + kHills[w].phase;
    sine[w] = kHills[w].height_m * std::sin(angle);
    cosine[w] = kHills[w].height_m * std::cos(angle);
  }
  for (int column = 0; column < columns; ++column) {
    double height = 100.0 + 0.06 * (part(bits_at(column, row, 1), 0) - 0.5);
    for (std::size_t w = 0; w < kHills.size(); ++w) {
      const std::size_t at = column * kHills.size() + w;
      height += tables.sine[at] * cosine[w] + tables.cosine[at] * sine[w];
    }
    out[column] = static_cast<float>(height);
  }
}

// Hedges run along a lattice of fields, each stretch standing or not, with a gate in it.
double hedge_m(int column, int row) {
  constexpr int kWidth = 128, kDepth = 96, kThick = 2, kGate = 6;
  double height = 0.0;
  if (column % kWidth < kThick && row % kDepth >= kGate) {
    const std::uint64_t bits = bits_at(column / kWidth, row / kDepth, 2);
    if (part(bits, 0) < 0.6) height = 1.5 + 2.5 * part(bits, 1);
  }
  if (row % kDepth < kThick && column % kWidth >= kGate) {
    const std::uint64_t bits = bits_at(column / kWidth, row / kDepth, 3);
    if (part(bits, 0) < 0.6) height = std::max(height, 1.5 + 2.5 * part(bits, 1));
  }
  return height;
}

// A farmyard has up to nine buildings on a lattice of 32 m.
double roof_m(int column, int row) {
  constexpr int kFarm = 256, kPlot = 32;
  if (part(bits_at(column / kFarm, row / kFarm, 4), 0) > 0.35) return 0.0;
  const int plot_column = column % kFarm / kPlot, plot_row = row % kFarm / kPlot;
  if (plot_column < 3 || plot_column > 5 || plot_row < 2 || plot_row > 4) return 0.0;
  const std::uint64_t bits = bits_at(column / kPlot, row / kPlot, 5);
  if (part(bits, 0) < 0.3) return 0.0;
  double along = column % kPlot - 16.0, across = row % kPlot - 16.0;
  if (part(bits, 1) < 0.5) std::swap(along, across);
  const double half_width = 4.0 + 3.0 * part(bits, 2), half_length = 6.0 + 7.0 * part(bits, 3);
  if (std::abs(along) > half_length || std::abs(across) > half_width) return 0.0;
  return 3.0 + 2.0 * part(bits, 4) + 0.6 * (half_width - std::abs(across));
}

// At most one tree per 16 m; in woods most places have one.
double tree_m(int column, int row) {
  constexpr int kWood = 192, kPlace = 16;
  const bool wood = part(bits_at(column / kWood, row / kWood, 6), 0) < 0.12;
  const std::uint64_t bits = bits_at(column / kPlace, row / kPlace, 7);
  if (part(bits, 0) > (wood ? 0.8 : 0.05)) return 0.0;
  const double radius = 2.5 + 3.0 * part(bits, 1);
  const double east = column % kPlace - 8.0 - 4.0 * (part(bits, 2) - 0.5);
  const double south = row % kPlace - 8.0 - 4.0 * (part(bits, 3) - 0.5);
  const double apart = (east * east + south * south) / (radius * radius);
  if (apart > 1.0) return 0.0;
  return (6.0 + 14.0 * part(bits, 4)) * (0.35 + 0.65 * std::sqrt(1.0 - apart));
}

void write_heights(const Country& country, const std::filesystem::path& file, bool with_things) {
  GridFrame frame;
  frame.columns = frame.rows = country.side;
  frame.west = 500'000.0;
  frame.north = 5'760'000.0;
  frame.crs_wkt = crs_wkt_of_epsg(kUtmZone31);
  LayerWriter writer(country.folder, {file.filename().string(), "height", "m", 0.01}, frame);
  const WaveTables tables(frame.columns);
  std::vector<float> strip(static_cast<std::size_t>(frame.columns) * kStripRows);
  for (int first = 0; first < frame.rows; first += kStripRows) {
    const int rows = std::min(kStripRows, frame.rows - first);
    for (int row = first; row < first + rows; ++row) {
      float* line = strip.data() + static_cast<std::size_t>(row - first) * frame.columns;
      ground_row(tables, row, frame.columns, line);
      if (!with_things) continue;
      for (int column = 0; column < frame.columns; ++column) {
        line[column] +=
            static_cast<float>(std::max({hedge_m(column, row), roof_m(column, row), tree_m(column, row)}));
      }
    }
    writer.write({0, first, frame.columns, rows}, strip.data());
  }
  writer.finish();
}

}  // namespace

std::vector<Country> countries_in(const std::filesystem::path& folder, const std::vector<int>& sides) {
  std::vector<Country> countries;
  for (const int side : sides) countries.push_back({side, folder / fmt::format("{}", side)});
  return countries;
}

void write_countries(const std::vector<Country>& countries) {
  start_geo();
  for (const Country& country : countries) {
    std::filesystem::create_directories(country.folder);
    std::ofstream(country.plan()) << kPlan;
  }
  tbb::parallel_for(std::size_t{0}, 2 * countries.size(), [&](std::size_t i) {
    const Country& country = countries[i / 2];
    const bool surface = i % 2 == 1;
    write_heights(country, surface ? country.surface() : country.ground(), surface);
  });
}

}  // namespace sunfall::bench

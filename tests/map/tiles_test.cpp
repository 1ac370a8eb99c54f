// The map does not show how it was cut, ordered or shared among threads.

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <fstream>
#include <set>

#include "map/map_run.h"
#include "shade/rough_ground.h"

namespace sunfall::testing {
namespace {

std::string bytes_of(const std::filesystem::path& file) {
  std::ifstream in(file, std::ios::binary);
  return {std::istreambuf_iterator<char>(in), {}};
}

std::set<std::string> names_in(const std::filesystem::path& folder) {
  std::set<std::string> names;
  for (const auto& entry : std::filesystem::directory_iterator(folder)) names.insert(entry.path().filename());
  return names;
}

TEST(Tiles, OrderAndThreadsLeaveTheSameBytes) {
  SceneOptions options;
  options.columns = 150;
  options.rows = 110;
  options = centred(options, 25831, 5.0, 52.0);
  const Scene scene([](double e, double n) { return rough_height(e, n); }, {}, options);
  for (const ReceiverPlane plane : {ReceiverPlane::level, ReceiverPlane::ground}) {
    Plan plan = clear_plan(scene, options);
    plan.site.receiver_plane = plane;
    plan.output.shares = true;
    const PlanLight light = light_of_plan(plan);
    const MapRun first(plan, light, {1, 48, false});
    const std::set<std::string> names = names_in(first.folder());
    EXPECT_EQ(names.size(), 12U + 4U + 24U);
    std::vector<MapOptions> others{{2, 48, true}};
    if (plane == ReceiverPlane::level) others.insert(others.end(), {{2, 48, false}, {1, 48, true}});
    for (const MapOptions& other : others) {
      const MapRun second(plan, light, other);
      ASSERT_EQ(names_in(second.folder()), names);
      for (const std::string& name : names)
        EXPECT_TRUE(bytes_of(first.folder() / name) == bytes_of(second.folder() / name)) << name;
      EXPECT_EQ(first.result().mean_sight, second.result().mean_sight);
      EXPECT_EQ(first.result().valid_fraction, second.result().valid_fraction);
    }
  }
}

constexpr int kColumns = 320, kRows = 264;
constexpr double kWithin = 0.005;  // what is asked of any two tile sizes, as part of the open field's light
constexpr double kBlockLength = 14.0;  // cells: how far along a border differences may be of one cause

// Bare hills with bumps, and the same with blocks on it (rough_ground.h), away from the map's own symmetry.
double hill(double east, double north) {
  return 12.0 * std::sin(0.02 * (east + 13.0)) * std::cos(0.03 * (north + 7.0)) +
         0.3 * noise(static_cast<int>(std::floor(east)) + 13, static_cast<int>(std::floor(north)) + 7);
}
double blocks(double east, double north) { return rough_height(east + 13.0, north + 7.0); }

// Differences of two maps in one layer, as parts of the open field's light; missing where either is.
class Differences {
 public:
  Differences(const Grid<float>& tiled, const Grid<float>& whole, double open) : values_(tiled.frame()) {
    for (std::size_t i = 0; i < values_.values().size(); ++i) {
      const double difference = (double(tiled.values()[i]) - double(whole.values()[i])) / open;
      values_.values()[i] = difference;
      if (!std::isnan(difference)) sorted_.push_back(std::abs(difference));
    }
    std::sort(sorted_.begin(), sorted_.end());
  }
  double mean() const {
    double sum = 0.0;
    for (const double value : sorted_) sum += value;
    return sum / double(sorted_.size());
  }
  double within(double part) const {
    return sorted_[static_cast<std::size_t>(part * double(sorted_.size()))];
  }

  // The step from one column (or row) to the next in the differences: its mean along the line, and
  // the root of its mean square.
  struct Step {
    double mean = 0.0;
    double rms = 0.0;
    double count = 0.0;
  };
  Step step(int line, bool columns) const {
    Step out;
    const int length = columns ? values_.rows() : values_.columns();
    for (int i = 0; i < length; ++i) {
      const double jump = columns ? values_.at(line, i) - values_.at(line - 1, i)
                                  : values_.at(i, line) - values_.at(i, line - 1);
      if (std::isnan(jump)) continue;
      out.mean += jump;
      out.rms += jump * jump;
      out.count += 1.0;
    }
    out.mean /= out.count;
    out.rms = std::sqrt(out.rms / out.count);
    return out;
  }

 private:
  Grid<double> values_;
  std::vector<double> sorted_;
};

// A seam is a step that keeps its sign along a border. Without one, jumps across a border are draws
// of the same kind as anywhere else, and their mean stays within four of its standard errors: of n
// jumps, n / kBlockLength are of their own cause.
void expect_no_seam(const Differences& found, int size) {
  for (const bool columns : {true, false}) {
    const int lines = columns ? kColumns : kRows;
    double square = 0.0;
    int inner = 0;
    for (int line = 1; line < lines; ++line) {
      if (line % size == 0) continue;
      square += std::pow(found.step(line, columns).rms, 2);
      ++inner;
    }
    const double elsewhere = std::sqrt(square / inner);
    for (int line = size; line < lines; line += size) {
      const Differences::Step border = found.step(line, columns);
      EXPECT_LT(std::abs(border.mean), 4.0 * elsewhere / std::sqrt(border.count / kBlockLength))
          << (columns ? "column " : "row ") << line;
    }
  }
}

void compare_sizes(const std::optional<Height>& surface) {
  SceneOptions options;
  options.columns = kColumns;
  options.rows = kRows;
  options.receiver_height_m = 0.5;
  options = centred(options, 25831, 5.0, 52.0);
  const Scene scene(hill, surface, options);
  Plan plan = clear_plan(scene, options);
  plan.dome.sky = SkyModel::isotropic;
  const PlanLight light = light_of_plan(plan);
  const MapRun whole(plan, light, {0, 512, false});
  for (const int size : {64, 128, 200}) {
    SCOPED_TRACE(size);
    const MapRun tiled(plan, light, {0, size, false});
    for (std::size_t m = 0; m < 12; ++m) {
      const std::string name = light.dome.periods[m].name;
      const Differences found(tiled.dli(name), whole.dli(name), whole.open_dli(m));
      EXPECT_LT(found.mean(), kWithin) << name;
      EXPECT_LT(found.within(0.95), kWithin) << name;
      if (name == "06" || name == "12") expect_no_seam(found, size);
    }
    const Differences year(tiled.dli("year"), whole.dli("year"), whole.result().open.year);
    EXPECT_LT(year.within(0.95), kWithin);
  }
}

TEST(Tiles, SizesAgreeOnBareHills) { compare_sizes({}); }
TEST(Tiles, SizesAgreeAmongBlocks) { compare_sizes(blocks); }

}  // namespace
}  // namespace sunfall::testing

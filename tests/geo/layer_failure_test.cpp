// Whatever write fails, a layer stands whole under its name or not at all.

#include <gmock/gmock.h>
#include <sched.h>
#include <sys/mount.h>
#include <sys/resource.h>
#include <sys/stat.h>
#include <sys/wait.h>
#include <unistd.h>

#include <cstdio>
#include <random>

#include <fmt/format.h>

#include "geo/geo_support.h"
#include "geo/layer_writer.h"

namespace sunfall::test {
namespace {

constexpr int kSide = 600;
constexpr std::size_t kRaw_bytes = kSide * kSide * sizeof(float);

// Noise does not compress, so the finished file is larger than the plain one.
std::vector<float> noise() {
  std::mt19937 random(20240601);
  std::uniform_real_distribution<float> light(0.0F, 60.0F);
  std::vector<float> values(static_cast<std::size_t>(kSide) * kSide);
  for (float& value : values) value = light(random);
  return values;
}

enum Outcome { finished = 0, refused = 3, wrong = 4, not_possible = 5 };

// Writes the layer and judges: refused means Error(io) and an empty folder, finished a file that
// holds every value.
Outcome try_layer(const std::filesystem::path& folder, const std::vector<float>& values) {
  const GridFrame frame = utm_frame(kSide, kSide);
  try {
    LayerWriter writer(folder, {"dli-01.tif", "noise", "1", 0.0, false, {}}, frame);
    writer.write({0, 0, kSide, kSide}, values.data());
    writer.finish();
  } catch (const Error& error) {
    if (error.kind() != ErrorKind::io || error.parts().found.empty()) return wrong;
    return std::filesystem::is_empty(folder) ? refused : wrong;
  }
  const Grid<float> back = read_layer(folder / "dli-01.tif", {0, 0, kSide, kSide});
  return back.values() == values ? finished : wrong;
}

// Runs `action` in a child process, whose limits and mounts end with it.
Outcome in_child(const std::function<Outcome()>& action) {
  const pid_t child = ::fork();
  if (child == 0) {
    Outcome outcome = wrong;
    try {
      outcome = action();
    } catch (...) {
      outcome = wrong;
    }
    ::_exit(outcome);
  }
  int status = 0;
  ::waitpid(child, &status, 0);
  return WIFEXITED(status) ? static_cast<Outcome>(WEXITSTATUS(status)) : wrong;
}

Outcome under_size_limit(std::size_t limit_bytes, const std::vector<float>& values) {
  const TempFolder folder;
  return in_child([&] {
    const rlimit limit{limit_bytes, limit_bytes};
    if (::setrlimit(RLIMIT_FSIZE, &limit) != 0) return not_possible;
    return try_layer(folder.path(), values);
  });
}

// Tries limits from too small for the plain file up to enough for the finished one with its
// overviews, so that the limit falls on every stage in turn.
void expect_whole_or_nothing(Outcome (*attempt)(std::size_t, const std::vector<float>&),
                             std::size_t most_bytes) {
  const std::vector<float> values = noise();
  int refusals = 0;
  int layers = 0;
  for (std::size_t limit = kRaw_bytes / 2; limit <= most_bytes; limit += (most_bytes - kRaw_bytes / 2) / 24) {
    const Outcome outcome = attempt(limit, values);
    ASSERT_TRUE(outcome == refused || outcome == finished) << limit << ": " << outcome;
    refusals += outcome == refused;
    layers += outcome == finished;
  }
  EXPECT_GT(refusals, 5);
  EXPECT_GT(layers, 0);
}

TEST(LayerFailure, AFileSizeLimitAtAnyPlace) { expect_whole_or_nothing(under_size_limit, 2 * kRaw_bytes); }

// A file system of a given size, seen only by the child process.
Outcome on_small_disk(std::size_t disk_bytes, const std::vector<float>& values) {
  const TempFolder folder;
  return in_child([&] {
    const int spaces = ::geteuid() == 0 ? CLONE_NEWNS : CLONE_NEWNS | CLONE_NEWUSER;
    if (::unshare(spaces) != 0) return not_possible;
    ::mount(nullptr, "/", nullptr, MS_REC | MS_PRIVATE, nullptr);
    const std::string size = fmt::format("size={}", disk_bytes);
    if (::mount("tmpfs", folder.path().c_str(), "tmpfs", 0, size.c_str()) != 0) return not_possible;
    return try_layer(folder.path(), values);
  });
}

TEST(LayerFailure, AFullDiskAtAnyPlace) {
  if (on_small_disk(16 * kRaw_bytes, noise()) == not_possible)
    GTEST_SKIP() << "no right to mount a small disk here";
  expect_whole_or_nothing(on_small_disk, 4 * kRaw_bytes);
}

TEST(LayerFailure, AFolderThatIsNotThere) {
  const TempFolder folder;
  const Error::Parts parts = refusal(ErrorKind::io, [&] {
    LayerWriter(folder / "missing", {"a.tif", "", "", 0.0, false, {}}, utm_frame(4, 4));
  });
  EXPECT_THAT(parts.where, testing::HasSubstr("missing"));
}

TEST(LayerFailure, AnUnfinishedLayerLeavesNothing) {
  const TempFolder folder;
  const std::vector<float> values(16, 1.0F);
  {
    LayerWriter writer(folder.path(), {"a.tif", "", "", 0.0, false, {}}, utm_frame(4, 4));
    writer.write({0, 0, 4, 4}, values.data());
    EXPECT_TRUE(folder.names().empty());
  }
  EXPECT_TRUE(folder.names().empty());
}

// A fault of ours, but one that must not become a map with holes in it.
TEST(LayerFailure, TilesForgottenOrWrittenTwiceAreNoticed) {
  const TempFolder folder;
  const std::vector<float> values(16, 1.0F);
  LayerWriter short_of(folder.path(), {"a.tif", "", "", 0.0, false, {}}, utm_frame(4, 4));
  short_of.write({0, 0, 4, 3}, values.data());
  refusal(ErrorKind::internal, [&] { short_of.finish(); });
  LayerWriter twice(folder.path(), {"b.tif", "", "", 0.0, false, {}}, utm_frame(4, 4));
  twice.write({0, 0, 4, 2}, values.data());
  twice.write({0, 1, 4, 2}, values.data());
  EXPECT_ANY_THROW(twice.finish());
  EXPECT_TRUE(folder.names().empty());
}

}  // namespace
}  // namespace sunfall::test

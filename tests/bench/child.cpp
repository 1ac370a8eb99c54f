#include "bench/child.h"

#include <fcntl.h>
#include <fmt/format.h>
#include <spawn.h>
#include <sys/resource.h>
#include <sys/wait.h>
#include <unistd.h>

#include <chrono>
#include <stdexcept>

namespace sunfall::bench {
namespace {

double seconds(const timeval& time) { return double(time.tv_sec) + 1e-6 * double(time.tv_usec); }

constexpr double kKibibytesPerMebibyte = 1024.0;

}  // namespace

ChildCost run_child(const std::vector<std::string>& words, const std::filesystem::path& output) {
  std::vector<char*> arguments;
  for (const std::string& word : words) arguments.push_back(const_cast<char*>(word.c_str()));
  arguments.push_back(nullptr);
  posix_spawn_file_actions_t streams;
  posix_spawn_file_actions_init(&streams);
  posix_spawn_file_actions_addopen(&streams, STDIN_FILENO, "/dev/null", O_RDONLY, 0);
  posix_spawn_file_actions_addopen(&streams, STDOUT_FILENO, output.c_str(), O_WRONLY | O_CREAT | O_TRUNC,
                                   0644);
  const auto begin = std::chrono::steady_clock::now();
  pid_t process = -1;
  const int fault = posix_spawnp(&process, arguments[0], &streams, nullptr, arguments.data(), environ);
  posix_spawn_file_actions_destroy(&streams);
  if (fault != 0) throw std::runtime_error(fmt::format("{} cannot be started", words.front()));
  int state = 0;
  rusage used{};
  if (wait4(process, &state, 0, &used) != process) throw std::runtime_error("a child is lost");
  const double wall_s = std::chrono::duration<double>(std::chrono::steady_clock::now() - begin).count();
  if (!WIFEXITED(state) || WEXITSTATUS(state) != 0) {
    throw std::runtime_error(fmt::format("{} {} failed", words.front(), words.size() > 1 ? words[1] : ""));
  }
  return {{wall_s, seconds(used.ru_utime) + seconds(used.ru_stime)},
          double(used.ru_maxrss) / kKibibytesPerMebibyte};
}

double own_peak_mib() {
  rusage used{};
  getrusage(RUSAGE_SELF, &used);
  return double(used.ru_maxrss) / kKibibytesPerMebibyte;
}

}  // namespace sunfall::bench

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

// Waits for a good end, and tells what it took.
rusage wait_for(pid_t process, const std::string& name) {
  int state = 0;
  rusage used{};
  if (wait4(process, &state, 0, &used) != process) throw std::runtime_error(name + " is lost");
  if (!WIFEXITED(state) || WEXITSTATUS(state) != 0) throw std::runtime_error(name + " failed");
  return used;
}

}  // namespace

void run_apart(const std::function<void()>& work) {
  std::fflush(nullptr);
  const pid_t process = fork();
  if (process < 0) throw std::runtime_error("no fork");
  if (process > 0) {
    wait_for(process, "the work apart");
    return;
  }
  try {
    work();
    _exit(0);
  } catch (const std::exception& fault) {
    fmt::print(stderr, "{}\n", fault.what());
    _exit(1);
  }
}

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
  const rusage used = wait_for(process, words.front());
  const double wall_s = std::chrono::duration<double>(std::chrono::steady_clock::now() - begin).count();
  return {{wall_s, seconds(used.ru_utime) + seconds(used.ru_stime)},
          double(used.ru_maxrss) / kKibibytesPerMebibyte};
}

double own_peak_mib() {
  rusage used{};
  getrusage(RUSAGE_SELF, &used);
  return double(used.ru_maxrss) / kKibibytesPerMebibyte;
}

}  // namespace sunfall::bench

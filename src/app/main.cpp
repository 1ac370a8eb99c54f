// sunfall: parse, run, report errors. All work is in the library.

#include <fmt/format.h>
#include <CLI/CLI.hpp>

#include <algorithm>
#include <array>
#include <cerrno>
#include <cstdio>
#include <new>
#include <system_error>

#include "app/command_line.h"
#include "app/interrupt.h"
#include "geo/layer_writer.h"
#include "plan/words.h"
#include "sunfall/error.h"
#include "sunfall/version.h"

namespace {

constexpr const char* kFooter = R"(Examples:
  sunfall vet  fields/alder-reach/alder-reach.toml
  sunfall map  fields/alder-reach/alder-reach.toml -o outputs/alder-reach
  sunfall spot fields/alder-reach/alder-reach.toml --at 691300,5759250

Light is given as daily light integral (DLI): moles of photons of 400 to 700 nm per square metre and
day, mol m-2 d-1. Exit status: 0 done, 2 the command line or plan is wrong, 3 an input is wrong,
4 reading or writing failed, 5 interrupted, 1 a fault of ours. Never look into the sun to check a map.)";

using sunfall::Error;
using sunfall::ErrorKind;

// The parser only says that a command is missing, even where an unknown one is given.
[[noreturn]] void refuse_command_line(const CLI::App& app, int argc, char** argv,
                                      const CLI::ParseError& fault) {
  std::vector<std::string> known;
  for (const CLI::App* command : app.get_subcommands({})) known.push_back(command->get_name());
  const std::string first = argc > 1 ? argv[1] : "";
  const bool is_known = std::find(known.begin(), known.end(), first) != known.end();
  const std::string remedy = fmt::format("Try: sunfall {}--help", is_known ? first + " " : "");
  if (!is_known && !first.empty() && first.front() != '-') {
    throw Error(ErrorKind::plan, {"there is no such command", "command line", sunfall::in_quotes(first),
                                  sunfall::did_you_mean(first, known) + ". " + remedy});
  }
  throw Error(ErrorKind::plan, {fault.what(), "command line", "", remedy});
}

// What is printed waits in a buffer; a full disk or a closed pipe shows only when that is emptied.
void finish_printing() {
  if (std::fflush(stdout) == 0 && std::ferror(stdout) == 0) return;
  throw Error(ErrorKind::io, {"the results cannot be written", "standard output",
                              std::generic_category().message(errno), "Check where the output is sent"});
}

// Names from plans and files may hold anything; on a terminal they must not do anything.
int tell(ErrorKind kind, const std::string& message) {
  constexpr std::size_t longest = 4000;
  const std::string line = fmt::format("sunfall: {}\n", sunfall::harmless(message, longest));
  // Where standard error is closed or full, the status alone tells.
  static_cast<void>(std::fputs(line.c_str(), stderr));
  return sunfall::exit_status(kind);
}

int run(int argc, char** argv) {
  CLI::App app{"How much light each square metre of a field gets, month by month.", "sunfall"};
  app.footer(kFooter);
  app.set_version_flag("--version",
                       fmt::format("sunfall {}\n{}", sunfall::kVersion, sunfall::geo_versions()));
  app.require_subcommand(1);
  struct Entry {
    CLI::App* command = nullptr;
    sunfall::Action action;
  };
  std::array<Entry, 3> commands;
  commands[0].action = sunfall::add_vet(app, commands[0].command);
  commands[1].action = sunfall::add_map(app, commands[1].command);
  commands[2].action = sunfall::add_spot(app, commands[2].command);
  try {
    app.parse(argc, argv);
  } catch (const CLI::ParseError& error) {
    if (error.get_exit_code() != 0) refuse_command_line(app, argc, argv, error);
    app.exit(error);  // prints help or version
    finish_printing();
    return 0;
  }
  for (const Entry& entry : commands) {
    if (entry.command->parsed()) entry.action();
  }
  finish_printing();
  return 0;
}

}  // namespace

int main(int argc, char** argv) {
  try {
    sunfall::watch_for_interrupts();
    sunfall::start_geo();
    return run(argc, argv);
  } catch (const Error& error) {
    return tell(error.kind(), error.what());
  } catch (const std::bad_alloc&) {
    return tell(ErrorKind::io, "memory ran out. Use fewer --jobs, or cut the map.");
  } catch (const std::system_error& error) {
    return tell(ErrorKind::io,
                fmt::format("the system refused: {}. Check disk, memory and limits.", error.what()));
  } catch (const std::exception& error) {
    return tell(ErrorKind::internal,
                fmt::format("a fault of ours: {}. Please report it with the plan.", error.what()));
  }
}

// sunfall: parse, run, report errors. All work is in the library.

#include <fmt/format.h>
#include <CLI/CLI.hpp>

#include <array>
#include <new>

#include "app/command_line.h"
#include "app/interrupt.h"
#include "geo/layer_writer.h"
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
    if (error.get_exit_code() == 0) return app.exit(error);
    fmt::print(stderr, "sunfall: {}. Try: sunfall --help\n", error.what());
    return sunfall::exit_status(sunfall::ErrorKind::plan);
  }
  for (const Entry& entry : commands) {
    if (entry.command->parsed()) entry.action();
  }
  return 0;
}

}  // namespace

int main(int argc, char** argv) {
  try {
    sunfall::watch_for_interrupts();
    sunfall::start_geo();
    return run(argc, argv);
  } catch (const sunfall::Error& error) {
    fmt::print(stderr, "sunfall: {}\n", error.what());
    return sunfall::exit_status(error.kind());
  } catch (const std::bad_alloc&) {
    fmt::print(stderr, "sunfall: memory ran out. Use fewer --jobs, or cut the map\n");
    return sunfall::exit_status(sunfall::ErrorKind::io);
  } catch (const std::exception& error) {
    fmt::print(stderr, "sunfall: a fault of ours: {}. Please report it with the plan\n", error.what());
    return sunfall::exit_status(sunfall::ErrorKind::internal);
  }
}

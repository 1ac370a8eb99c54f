#pragma once
// What every command shares: its options, and how it is registered.

#include <CLI/CLI.hpp>
#include <filesystem>
#include <optional>
#include <string>

#include "map/site.h"
#include "sunfall/plan.h"

namespace sunfall {

struct CommonOptions {
  std::filesystem::path plan;
  int jobs = 0;
  bool quiet = false;
  bool json = false;
  std::string dome;  // empty: as the plan says
};

// Adds a command with the common options; `options` must outlive the parse.
CLI::App* add_command(CLI::App& app, const std::string& name, const std::string& purpose,
                      CommonOptions& options);

// Reads the plan and applies what the command line says instead.
Plan plan_of(const CommonOptions& options);

// Checks that memory can hold the plan's map, and opens its inputs.
Site site_of(const Plan& plan);

// Each command registers itself and returns what to run when it was asked for. Another command is
// one file and one line in main.cpp.
using Action = std::function<void()>;
Action add_vet(CLI::App& app, CLI::App*& command);
Action add_map(CLI::App& app, CLI::App*& command);
Action add_spot(CLI::App& app, CLI::App*& command);

}  // namespace sunfall

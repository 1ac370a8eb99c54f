#include "app/command_line.h"

#include "app/memory.h"

namespace sunfall {

CLI::App* add_command(CLI::App& app, const std::string& name, const std::string& purpose,
                      CommonOptions& options) {
  CLI::App* command = app.add_subcommand(name, purpose);
  command->add_option("PLAN", options.plan, "the plan, a TOML file")->required();
  command->add_option("--jobs", options.jobs, "worker threads; 0 for one per core")
      ->check(CLI::Range(0, 1024));
  command->add_option("--dome", options.dome, "how finely the sky is cut, instead of the plan's choice")
      ->check(CLI::IsMember({"draft", "standard", "fine"}));
  command->add_flag("--quiet", options.quiet, "say nothing but errors");
  command->add_flag("--json", options.json, "one line of JSON on standard output instead of text");
  return command;
}

Plan plan_of(const CommonOptions& options) {
  Plan plan = read_plan(options.plan);
  if (options.dome == "draft") plan.dome.quality = DomeQuality::draft;
  if (options.dome == "standard") plan.dome.quality = DomeQuality::standard;
  if (options.dome == "fine") plan.dome.quality = DomeQuality::fine;
  return plan;
}

Site site_of(const Plan& plan) {
  require_memory_for(plan);
  return open_site(plan);
}

}  // namespace sunfall

#include "cli/cli.h"

#include <CLI/CLI.hpp>
#include <iostream>

#include "base/version.h"
#include "cli/commands.h"

namespace gaskettle {

namespace {
constexpr const char* about =
    "Gaskettle: how hot, how high in pressure, how soon - for gas vessels that are heated, stirred or\n"
    "loaded by a piston. Reads a YAML model, integrates the energy balance, writes an HDF5 record.\n"
    "A lumped model, not a design approval: local codes and licensed practice decide.";
constexpr const char* closing =
    "To start:\n"
    "  gaskettle new                              lists models to start from\n"
    "  gaskettle new bakeout_chamber > my.yaml    writes one\n"
    "  gaskettle check my.yaml                    what it is in numbers, and what looks wrong\n"
    "  gaskettle run my.yaml                      simulates; record in my.h5\n"
    "  gaskettle explain heaters                  the keys of a section\n"
    "Exit status: 0 done; 1 stopped early or books not closed; 2 input refused; 3 a limit was exceeded;\n"
    "4 a target was not reached; 130 interrupted.";
}  // namespace

int run_command_line(int argc, char** argv) {
  CLI::App app(about, "gaskettle");
  app.footer(closing);
  app.require_subcommand(1);
  app.set_version_flag("--version", std::string(program_version) + " (" + source_revision + ")");
  int status = exit_done;

  RunArguments run;
  CLI::App* run_command = app.add_subcommand("run", "Simulate a model: print the answer, write the record");
  run_command->add_option("FILE", run.file, "model, or a file of configs/ that names one")->required();
  run_command->add_option("-o,--output", run.output, "record to write (the model's stem + .h5, here)");
  run_command->add_option("--set", run.set, "PATH=VALUE, e.g. heaters.element.rating='8 kW'; repeatable")
      ->allow_extra_args(false);
  run_command->add_flag("--overwrite", run.overwrite, "replace whatever file stands at the record's place");
  run_command->add_flag("--json", run.json, "print the answer as one JSON object, SI units");
  run_command->callback([&] { status = command_run(run); });

  CheckArguments check;
  CLI::App* check_command =
      app.add_subcommand("check", "Read and check a model only; print what the plant is in numbers");
  check_command->add_option("FILE", check.file, "model, or a file of configs/")->required();
  check_command->add_option("--set", check.set, "PATH=VALUE; repeatable")->allow_extra_args(false);
  check_command->add_flag("--json", check.json, "print as one JSON object, SI units");
  check_command->callback([&] { status = command_check(check); });

  std::string kind;
  CLI::App* new_command = app.add_subcommand("new", "Print a commented model to start from; bare, list them");
  new_command->add_option("KIND", kind, "which model");
  new_command->callback([&] { status = command_new(kind); });

  ExportArguments exporting;
  CLI::App* export_command = app.add_subcommand("export", "Print a record as CSV, units in the header");
  export_command->add_option("RECORD", exporting.record, "a record, OUT.h5")->required();
  export_command->add_option("--channels", exporting.channels, "NAME,NAME,... (all)");
  export_command->add_option("--every", exporting.every, "interval with its unit, e.g. '10 s' (every row)");
  export_command->add_option("-o,--output", exporting.output, "file to write (standard output)");
  export_command->callback([&] { status = command_export(exporting); });

  GasArguments gas;
  CLI::App* gas_command = app.add_subcommand("gas", "Print every property of a gas at one state");
  gas_command->add_option("NAME", gas.name, "name or formula")->required();
  gas_command->add_option("--temperature", gas.temperature, "e.g. '20 degC'")->required();
  CLI::Option* pressure =
      gas_command->add_option("--pressure", gas.pressure, "e.g. '10 bar abs'; gauge is above 101325 Pa");
  CLI::Option* density = gas_command->add_option("--density", gas.density, "e.g. '11 kg/m3' or '400 mol/m3'");
  pressure->excludes(density);
  gas_command->add_flag("--json", gas.json, "print as one JSON object, SI units");
  gas_command->callback([&] {
    if (gas.pressure.empty() && gas.density.empty()) throw CLI::RequiredError("--pressure or --density");
    status = command_gas(gas);
  });

  std::string word;
  CLI::App* explain_command =
      app.add_subcommand("explain", "The reference of a key, gas, material, film, unit or quantity");
  explain_command->add_option("WORD", word, "what to explain; bare, the overview");
  explain_command->callback([&] { status = command_explain(word); });

  try {
    app.parse(argc, argv);
  } catch (const CLI::ParseError& e) {
    const int code = app.exit(e, std::cout, std::cerr);
    return code == 0 ? exit_done : exit_refused;
  }
  return status;
}

}  // namespace gaskettle

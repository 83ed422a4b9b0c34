/// The commands of the program, one function each. They print and return an exit status.
#pragma once
#include <string>
#include <vector>

#include "cli/cli.h"

namespace gaskettle {

struct RunArguments {
  std::string file, output;
  std::vector<std::string> set;
  bool overwrite = false, json = false;
};
int command_run(const RunArguments& arguments);

struct CheckArguments {
  std::string file;
  std::vector<std::string> set;
  bool json = false;
};
int command_check(const CheckArguments& arguments);

int command_new(const std::string& kind);

struct ExportArguments {
  std::string record, output;
  std::string channels, every;
};
int command_export(const ExportArguments& arguments);

struct GasArguments {
  std::string name, temperature, pressure, density;
  bool json = false;
};
int command_gas(const GasArguments& arguments);

int command_explain(const std::string& word);

}  // namespace gaskettle

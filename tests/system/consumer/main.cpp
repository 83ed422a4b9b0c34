// Reads a model, runs it and looks for a record that is not there: this takes every library the package depends on.
#include <cstdio>
#include <exception>

#include "base/version.h"
#include "input/study_file.h"
#include "plant/plant.h"
#include "record/record_reader.h"
#include "run/case.h"

namespace {

bool run(const char* path) {
  gaskettle::Problems problems;
  const gaskettle::LoadedModel source = gaskettle::load_model(path, {}, problems);
  gaskettle::ReadContext context(problems);
  gaskettle::Plant plant(gaskettle::read_model(source.root, context), context);
  if (!problems.empty()) {
    std::fputs(problems.text().c_str(), stderr);
    return false;
  }
  const gaskettle::CaseResult result = gaskettle::run_case(plant, {});
  return !result.partial() && result.books_closed();
}

bool refuses_missing_record() {
  try {
    gaskettle::RecordReader record("no such record.h5");
  } catch (const gaskettle::RecordError&) {
    return true;
  }
  return false;
}

}  // namespace

int main(int argc, char** argv) try {
  if (argc != 2 || !run(argv[1]) || !refuses_missing_record()) return 1;
  std::printf("gaskettle %s\n", gaskettle::program_version);
  return 0;
} catch (const std::exception& error) {
  std::fprintf(stderr, "%s\n", error.what());
  return 1;
}

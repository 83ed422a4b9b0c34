#include <fmt/chrono.h>
#include <fmt/format.h>
#include <unistd.h>

#include <atomic>
#include <chrono>
#include <csignal>
#include <ctime>
#include <filesystem>
#include <iostream>

#include "base/version.h"
#include "cli/commands.h"
#include "cli/loading.h"
#include "gas/catalogue.h"
#include "plant/cautions.h"
#include "report/answer.h"
#include "run/case.h"

namespace gaskettle {

namespace {
std::atomic<bool> interrupted{false};
extern "C" void on_interrupt(int) { interrupted = true; }

/// Model file and overrides: what makes two records records of the same thing.
std::string identity(const LoadedModel& source) {
  std::string text = source.model_text;
  for (const auto& [path, value] : source.overrides) text += "\n" + path + "=" + value;
  return text;
}

Provenance provenance(const Loaded& loaded) {
  std::string overrides, cautionary;
  for (const auto& [path, value] : loaded.source.overrides) overrides += path + "=" + value + "\n";
  for (const std::string& c : cautions(*loaded.plant)) cautionary += c + "\n";
  const Model& m = loaded.plant->model();
  return {{"model_text", loaded.source.model_text},
          {"config_text", loaded.source.config_text},
          {"overrides", overrides},
          {"title", m.title},
          {"program_version", program_version},
          {"source_revision", source_revision},
          {"build", build_description},
          {"gas_data_version", gas_data_version()},
          {"rtol", fmt::format("{}", m.run.rtol)},
          {"cautions", cautionary},
          {"started", fmt::format("{:%Y-%m-%dT%H:%M:%SZ}", fmt::gmtime(std::time(nullptr)))}};
}

int exit_status(const CaseResult& r) {
  if (r.ending.reason == EndReason::interrupted) return exit_interrupted;
  if (r.partial() || !r.books_closed()) return exit_stopped_early;
  if (r.limit_broken()) return exit_limit_exceeded;
  return r.target_missed() ? exit_target_missed : exit_done;
}

/// A line that rewrites itself, on a terminal, once a run takes over half a second.
class ProgressLine {
public:
  void show(double t, double until) {
    if (isatty(STDERR_FILENO) == 0 || std::chrono::steady_clock::now() - began_ < std::chrono::milliseconds(500))
      return;
    std::cerr << fmt::format("\r  {:5.1f} %  {:.4g} s of {:.4g} s ", 100.0 * t / until, t, until) << std::flush;
    shown_ = true;
  }
  void clear() const {
    if (shown_) std::cerr << "\r" << std::string(60, ' ') << "\r" << std::flush;
  }

private:
  std::chrono::steady_clock::time_point began_ = std::chrono::steady_clock::now();
  bool shown_ = false;
};
}  // namespace

int command_run(const RunArguments& arguments) {
  const std::unique_ptr<Loaded> loaded = load_plant(arguments.file, arguments.set);
  if (!loaded->plant) {
    std::cerr << loaded->problems.text();
    return exit_refused;
  }
  std::signal(SIGINT, on_interrupt);
  std::signal(SIGTERM, on_interrupt);
  ProgressLine line;
  CaseOptions options;
  options.record_path =
      arguments.output.empty() ? std::filesystem::path(arguments.file).stem().string() + ".h5" : arguments.output;
  options.overwrite = arguments.overwrite;
  options.provenance = provenance(*loaded);
  options.identity = identity(loaded->source);
  options.interrupt = &interrupted;
  options.progress = [&](double t, double until) { line.show(t, until); };
  CaseResult result;
  try {
    result = run_case(*loaded->plant, options);
  } catch (const RecordError& e) {
    line.clear();
    std::cerr << "error: " << e.what() << "\n";
    return exit_refused;
  }
  line.clear();
  AnswerContext context{loaded->plant->model().title, arguments.file, loaded->plant->layout().advice,
                        exit_status(result)};
  std::cout << (arguments.json ? answer_json(*loaded->plant, result, context)
                               : answer_text(*loaded->plant, result, context));
  if (!arguments.json)
    std::cout << "\nRecord: " << result.record_path << (result.partial() ? " (partial)" : "") << "\n";
  std::cout.flush();
  return context.exit_status;
}

}  // namespace gaskettle

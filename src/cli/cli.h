/// The command line: arguments in, exit status out.
#pragma once

namespace gaskettle {

/// Exit statuses that scripts rely on.
enum ExitStatus {
  exit_done = 0,
  exit_stopped_early = 1,   ///< run stopped early, or the ledger did not close
  exit_refused = 2,         ///< input or usage refused, file not readable or not writable
  exit_limit_exceeded = 3,  ///< a limit was exceeded; the record is complete
  exit_target_missed = 4,   ///< a target was not reached; the record is complete
  exit_interrupted = 130
};

int run_command_line(int argc, char** argv);

}  // namespace gaskettle

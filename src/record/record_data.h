/// What a record holds, as plain data. SI units throughout; times in s from 0.
#pragma once
#include <cstdint>
#include <stdexcept>
#include <string>
#include <utility>
#include <variant>
#include <vector>

namespace gaskettle {

/// A record could not be written or read. The message names the file, what went
/// wrong and what would help. No exception of the file library leaves this floor.
class RecordError : public std::runtime_error {
public:
  using std::runtime_error::runtime_error;
};

/// One recorded quantity: a column along time.
struct ChannelInfo {
  std::string name;   ///< `part.quantity`; UTF-8, no slash, unique in its record, not `time`
  std::string units;  ///< UDUNITS text, "1" for pure numbers
  std::string long_name;
};

/// A quantity along time and depth in a wall.
struct ProfileInfo {
  std::string name;  ///< as a channel's: "shell.profile"
  std::string units;
  std::string long_name;
  std::string depth_name;     ///< "shell.depth"; profiles may share it when their depths are equal
  std::vector<double> depth;  ///< m from the inner face; at least one
};

/// Something that happened at an instant, with one value just before and just after.
struct EventRow {
  double time;  ///< s
  std::string part;
  std::string what;
  double before;
  double after;
};

/// When a target was reached.
struct TargetRow {
  std::string name;
  double time;  ///< s; NaN: not reached
};

/// How near a limit was come.
struct LimitRow {
  std::string name;
  double extreme;
  double extreme_time;  ///< s
  double margin;        ///< negative: exceeded
  double crossed_time;  ///< s; NaN: never crossed
};

using Attribute = std::variant<double, std::int64_t, std::string>;
using Attributes = std::vector<std::pair<std::string, Attribute>>;

/// What a run came to. `attributes` holds closure_energy, closure_mass, ended
/// (the reason), partial (0 or 1), solver counts and the like.
struct Outcome {
  std::vector<TargetRow> targets;
  std::vector<LimitRow> limits;
  Attributes attributes;
};

/// Where a record comes from: model_text, overrides, program_version, ...
using Provenance = std::vector<std::pair<std::string, std::string>>;

}  // namespace gaskettle

#include "record/csv_export.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace gaskettle {
namespace {

// Values held at a time: bounds the memory of an export whatever the record's length.
constexpr std::size_t most_values = 4'000'000;

// Multiples may overshoot the last time by rounding only.
constexpr double rounding = 1e-12;

std::string quoted(const std::string& field) {
  if (field.find_first_of(",\"\r\n") == std::string::npos) return field;
  std::string text = "\"";
  for (const char c : field) text += c == '"' ? std::string("\"\"") : std::string(1, c);
  return text + "\"";
}

// k * every; through the whole number of rows a second where there is one, so that 3 * 0.1 prints as 0.3.
double multiple(double k, double every) {
  const double inverse = std::round(1 / every);
  return inverse >= 1 && std::abs(inverse * every - 1) < rounding ? k / inverse : k * every;
}

/// Takes the record's rows one after the other and writes lines.
class Lines {
public:
  Lines(std::ostream& out, double every) : out_(out), every_(every) {}

  void add(double time, const std::vector<double>& values, bool last) {
    if (every_ == 0) {
      write(time, values);
    } else {
      sample_up_to(time, values, last);
    }
  }

private:
  // Writes the multiples from the row before up to this one, and those at this row itself once it is known to be
  // the last or the next one has come: of two rows at nearly the same time the later counts.
  void sample_up_to(double time, const std::vector<double>& values, bool last) {
    if (!started_) {
      next_ = std::ceil(time / every_ - rounding) + 0.0;  // no -0
      started_ = true;
    } else {
      for (; multiple(next_, every_) < time; ++next_) write_between(multiple(next_, every_), time, values);
    }
    if (last && multiple(next_, every_) <= time + rounding * std::abs(time)) write(multiple(next_, every_), values);
    time_before_ = time;
    before_ = values;
  }

  void write_between(double at, double time, const std::vector<double>& values) {
    const double part = std::clamp((at - time_before_) / (time - time_before_), 0.0, 1.0);
    mixed_.resize(values.size());
    for (std::size_t i = 0; i < values.size(); ++i) {
      mixed_[i] = part == 0 ? before_[i] : before_[i] + part * (values[i] - before_[i]);
    }
    write(at, mixed_);
  }

  void write(double time, const std::vector<double>& values) {
    line_.clear();
    fmt::format_to(std::back_inserter(line_), "{}", time);
    for (const double value : values) fmt::format_to(std::back_inserter(line_), ",{}", value);
    line_.push_back('\n');
    out_.write(line_.data(), static_cast<std::streamsize>(line_.size()));
  }

  std::ostream& out_;
  double every_;
  bool started_ = false;
  double next_ = 0;  ///< number of the multiple that is due
  double time_before_ = 0;
  std::vector<double> before_, mixed_;
  fmt::memory_buffer line_;
};

void write_header(const RecordReader& record, std::ostream& out, const std::vector<std::string>& channels) {
  out << "time [s]";
  for (const std::string& name : channels) {
    out << ',' << quoted(fmt::format("{} [{}]", name, record.channel_info(name).units));
  }
  out << '\n';
}

}  // namespace

void export_csv(const RecordReader& record, std::ostream& out, const std::vector<std::string>& channels, double every) {
  if (!(every >= 0) || !std::isfinite(every)) {
    throw RecordError(fmt::format("an export every {} s is not possible; give a positive time or none", every));
  }
  const std::vector<std::string> names = channels.empty() ? record.channel_names() : channels;
  for (const std::string& name : names) record.channel_info(name);
  write_header(record, out, names);
  const std::size_t block = std::max<std::size_t>(1024, most_values / (names.size() + 1));
  Lines lines(out, every);
  std::vector<double> row(names.size());
  for (std::size_t first = 0; first < record.rows(); first += block) {
    const std::size_t count = std::min(block, record.rows() - first);
    std::vector<std::vector<double>> columns;
    for (const std::string& name : names) columns.push_back(record.channel(name, first, count));
    for (std::size_t i = 0; i < count; ++i) {
      for (std::size_t j = 0; j < names.size(); ++j) row[j] = columns[j][i];
      lines.add(record.time()[first + i], row, first + i + 1 == record.rows());
    }
  }
}

}  // namespace gaskettle

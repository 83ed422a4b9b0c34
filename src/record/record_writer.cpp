#include "record/record_writer.h"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <chrono>
#include <cmath>
#include <filesystem>
#include <limits>
#include <map>
#include <set>

#include "record/hdf5_tools.hpp"
#include "record/record_place.h"
#include "record/record_table.hpp"

namespace gaskettle {
namespace {

constexpr std::size_t most_block_rows = 1024;
constexpr std::size_t most_pending_events = 1024;
// A flush is the one moment (below 1 ms at 100 channels) when a killed program can leave a file that does not open,
// so there are few of them.
constexpr std::chrono::seconds flush_interval{1};
constexpr std::size_t longest_attribute = 32 * 1024;  // bytes

std::size_t chunk_rows_for(std::size_t expected_rows) {
  return expected_rows == 0 ? most_block_rows : std::clamp<std::size_t>(expected_rows, 16, 4 * most_block_rows);
}

void check_name(const std::string& name, std::set<std::string>& taken) {
  if (name.empty() || name.find('/') != std::string::npos || name == "." || name == "..") {
    throw RecordError(fmt::format("\"{}\" cannot name a channel: a name is not empty and has no slash", name));
  }
  if (!taken.insert(name).second) {
    throw RecordError(fmt::format("\"{}\" names two things in a record; names are unique there", name));
  }
}

void check_names(const RecordWriter::Settings& settings) {
  std::set<std::string> taken = {"time", "events", "outcome", "provenance"};
  for (const ChannelInfo& channel : settings.channels) check_name(channel.name, taken);
  std::map<std::string, std::vector<double>> depths;
  for (const ProfileInfo& profile : settings.profiles) {
    check_name(profile.name, taken);
    if (profile.depth.empty()) throw RecordError(fmt::format("profile {} has no depths", profile.name));
    const auto [known, added] = depths.emplace(profile.depth_name, profile.depth);
    if (added) {
      check_name(profile.depth_name, taken);
    } else if (known->second != profile.depth) {
      throw RecordError(fmt::format("{} names two different sets of depths", profile.depth_name));
    }
  }
}

void describe(H5::DataSet& dataset, const std::string& units, const std::string& long_name) {
  hdf5::set_attribute(dataset, "units", units);
  hdf5::set_attribute(dataset, "long_name", long_name);
}

void write_provenance(const H5::Group& root, const Provenance& provenance) {
  H5::Group group = hdf5::create_group(root, "provenance");
  for (const auto& [name, text] : provenance) {
    if (name == "model_text" || text.size() > longest_attribute) {
      hdf5::create_long_text(group, name, text);
    } else {
      hdf5::set_attribute(group, name, text);
    }
  }
}

}  // namespace

/// The open file. Rows are buffered row after row and gathered into columns a block at a time.
class RecordWriter::File {
public:
  explicit File(Settings settings);
  ~File();
  void append(double time, std::span<const double> values, std::span<const double> profile_values);
  void add_event(const EventRow& event);
  void flush();
  std::string finish(const Outcome& outcome);
  void abandon();
  std::size_t rows() const { return rows_written_ + times_.size(); }

private:
  void create();
  void create_columns(H5::Group& root, hdf5::ScaleBook& scales);
  void create_profiles(H5::Group& root, hdf5::ScaleBook& scales, std::size_t time_scale);
  void write(bool flush_now);
  void flush_file();
  void write_block();
  bool flush_is_due() const;
  void write_gathered(H5::DataSet& dataset, std::size_t offset, std::size_t width);
  void write_events();
  void write_outcome(const Outcome& outcome);
  void set_partial(std::int64_t partial);
  void close();
  void check_open() const;

  Settings settings_;
  std::string temporary_;
  bool open_ = false;
  bool failed_ = false;
  std::size_t row_width_ = 0;  ///< values a row, profiles included
  std::size_t chunk_rows_ = 0;
  std::size_t block_rows_ = 0;
  H5::H5File file_;
  H5::DataSet time_;
  std::vector<H5::DataSet> channels_;
  std::vector<H5::DataSet> profiles_;
  hdf5::Table events_, targets_, limits_;
  std::chrono::steady_clock::time_point last_flush_ = std::chrono::steady_clock::now();
  hsize_t space_taken_ = 0;
  std::size_t rows_written_ = 0;
  double last_time_ = -std::numeric_limits<double>::infinity();
  std::vector<double> times_;
  std::vector<double> rows_;      ///< row after row
  std::vector<double> gathered_;  ///< one column of a block
  std::vector<EventRow> pending_events_;
};

RecordWriter::File::File(Settings settings) : settings_(std::move(settings)) {
  check_names(settings_);
  claim_place(settings_.path, settings_.identity, settings_.overwrite);
  temporary_ = partial_path(settings_.path);
  chunk_rows_ = chunk_rows_for(settings_.expected_rows);
  block_rows_ = std::min(chunk_rows_, most_block_rows);
  row_width_ = settings_.channels.size();
  for (const ProfileInfo& profile : settings_.profiles) row_width_ += profile.depth.size();
  try {
    hdf5::guarded(temporary_, "create the record", [&] { create(); });
  } catch (...) {
    failed_ = true;
    if (open_) abandon();
    throw;
  }
}

RecordWriter::File::~File() {
  try {
    // After a failed write another would fail too; what stands in the file stays.
    if (open_ && !failed_) flush();
  } catch (const std::exception&) {
  }
  close();
}

void RecordWriter::File::create() {
  file_ = hdf5::create_file(temporary_);
  open_ = true;
  H5::Group root = file_.openGroup("/");
  hdf5::set_attribute(root, "gaskettle_record", std::int64_t{1});
  hdf5::set_attribute(root, "identity", settings_.identity);
  for (const auto& [name, text] : settings_.provenance) {
    if (name == "title" || name == "program_version") hdf5::set_attribute(root, name, text);
  }
  hdf5::ScaleBook scales;
  create_columns(root, scales);
  events_ = hdf5::Table(root, "events", "event", hdf5::event_columns(), scales);
  H5::Group outcome = hdf5::create_group(root, "outcome");
  hdf5::set_attribute(outcome, "partial", std::int64_t{1});
  hdf5::set_attribute(outcome, "ended", std::string("not finished"));
  targets_ = hdf5::Table(outcome, "targets", "target", hdf5::target_columns(), scales);
  limits_ = hdf5::Table(outcome, "limits", "limit", hdf5::limit_columns(), scales);
  scales.write_back_references();
  write_provenance(root, settings_.provenance);
  flush_file();
}

void RecordWriter::File::create_columns(H5::Group& root, hdf5::ScaleBook& scales) {
  time_ = hdf5::create_column(root, "time", H5::PredType::IEEE_F64LE, chunk_rows_);
  describe(time_, "s", "time from the start");
  const std::array<std::size_t, 1> along_time = {scales.add_scale(time_, "time")};
  for (const ChannelInfo& channel : settings_.channels) {
    channels_.push_back(hdf5::create_column(root, channel.name, H5::PredType::IEEE_F64LE, chunk_rows_));
    describe(channels_.back(), channel.units, channel.long_name);
    scales.attach(channels_.back(), along_time);
  }
  create_profiles(root, scales, along_time[0]);
}

void RecordWriter::File::create_profiles(H5::Group& root, hdf5::ScaleBook& scales, std::size_t time_scale) {
  std::map<std::string, std::size_t> depth_scales;
  for (const ProfileInfo& profile : settings_.profiles) {
    if (!depth_scales.count(profile.depth_name)) {
      H5::DataSet depth = hdf5::create_fixed(root, profile.depth_name, profile.depth);
      describe(depth, "m", "depth from the inner face");
      depth_scales[profile.depth_name] = scales.add_scale(depth, profile.depth_name);
    }
    const hsize_t width = profile.depth.size();
    profiles_.push_back(hdf5::create_column(root, profile.name, H5::PredType::IEEE_F64LE, chunk_rows_, width));
    describe(profiles_.back(), profile.units, profile.long_name);
    const std::array<std::size_t, 2> along = {time_scale, depth_scales[profile.depth_name]};
    scales.attach(profiles_.back(), along);
  }
}

void RecordWriter::File::check_open() const {
  if (failed_) throw RecordError(temporary_ + ": an earlier write failed; nothing more can be added to it");
  if (!open_) throw RecordError(settings_.path + ": the record is finished; nothing can be added to it");
}

void RecordWriter::File::append(double time, std::span<const double> values, std::span<const double> profile_values) {
  check_open();
  if (!(time > last_time_) || !std::isfinite(time)) {
    throw RecordError(fmt::format("{}: a row at {} s follows one at {} s; times must increase strictly", settings_.path,
                                  time, last_time_));
  }
  const std::size_t wanted = settings_.channels.size();
  if (values.size() != wanted || profile_values.size() != row_width_ - wanted) {
    throw RecordError(fmt::format("{}: a row has {} + {} values; {} channels and {} profile values were declared",
                                  settings_.path, values.size(), profile_values.size(), wanted, row_width_ - wanted));
  }
  last_time_ = time;
  times_.push_back(time);
  rows_.insert(rows_.end(), values.begin(), values.end());
  rows_.insert(rows_.end(), profile_values.begin(), profile_values.end());
  if (times_.size() == block_rows_) write(flush_is_due());
}

void RecordWriter::File::add_event(const EventRow& event) {
  check_open();
  pending_events_.push_back(event);
  if (pending_events_.size() == most_pending_events) write(flush_is_due());
}

void RecordWriter::File::flush() {
  check_open();
  write(true);
}

bool RecordWriter::File::flush_is_due() const {
  return std::chrono::steady_clock::now() - last_flush_ >= flush_interval;
}

void RecordWriter::File::write(bool flush_now) {
  failed_ = true;
  hdf5::guarded(temporary_, "write the record", [&] {
    write_block();
    write_events();
    if (flush_now) flush_file();
  });
  failed_ = false;
  if (flush_now) last_flush_ = std::chrono::steady_clock::now();
}

void RecordWriter::File::flush_file() {
  hdf5::take_space(file_, temporary_, space_taken_);
  file_.flush(H5F_SCOPE_GLOBAL);
}

void RecordWriter::File::write_block() {
  const std::size_t count = times_.size();
  if (count == 0) return;
  hdf5::write_rows(time_, H5::PredType::NATIVE_DOUBLE, rows_written_, count, times_.data());
  std::size_t offset = 0;
  for (H5::DataSet& channel : channels_) write_gathered(channel, offset++, 1);
  for (std::size_t i = 0; i < profiles_.size(); ++i) {
    const std::size_t width = settings_.profiles[i].depth.size();
    write_gathered(profiles_[i], offset, width);
    offset += width;
  }
  rows_written_ += count;
  times_.clear();
  rows_.clear();
}

void RecordWriter::File::write_gathered(H5::DataSet& dataset, std::size_t offset, std::size_t width) {
  const std::size_t count = times_.size();
  gathered_.resize(count * width);
  for (std::size_t i = 0; i < count; ++i) {
    std::copy_n(rows_.begin() + static_cast<std::ptrdiff_t>(i * row_width_ + offset), width,
                gathered_.begin() + static_cast<std::ptrdiff_t>(i * width));
  }
  hdf5::write_rows(dataset, H5::PredType::NATIVE_DOUBLE, rows_written_, count, gathered_.data());
}

void RecordWriter::File::write_events() {
  events_.append(pending_events_.size(), hdf5::cells_of(pending_events_));
  pending_events_.clear();
}

void RecordWriter::File::write_outcome(const Outcome& outcome) {
  targets_.append(outcome.targets.size(), hdf5::cells_of(outcome.targets));
  limits_.append(outcome.limits.size(), hdf5::cells_of(outcome.limits));
  H5::Group group = file_.openGroup("outcome");
  group.removeAttr("ended");
  for (const auto& [name, value] : outcome.attributes) {
    if (name != "partial") hdf5::set_attribute(group, name, value);
  }
}

void RecordWriter::File::set_partial(std::int64_t partial) {
  const H5::Group group = file_.openGroup("outcome");
  group.openAttribute("partial").write(H5::PredType::NATIVE_INT64, &partial);
}

std::string RecordWriter::File::finish(const Outcome& outcome) {
  flush();
  failed_ = true;
  hdf5::guarded(temporary_, "write the outcome", [&] {
    write_outcome(outcome);
    std::int64_t partial = 0;
    for (const auto& [name, value] : outcome.attributes) {
      if (name != "partial") continue;
      partial = std::visit(
          [](const auto& given) {
            if constexpr (std::is_arithmetic_v<std::decay_t<decltype(given)>>) return given != 0;
            return true;
          },
          value);
    }
    flush_file();
    set_partial(partial);
    flush_file();
  });
  failed_ = false;
  close();
  std::error_code failed;
  std::filesystem::rename(temporary_, settings_.path, failed);
  if (failed) {
    throw RecordError(fmt::format("{}: could not give the record its name: {}; it stands complete in {}",
                                  settings_.path, failed.message(), temporary_));
  }
  return settings_.path;
}

void RecordWriter::File::abandon() {
  if (!open_) check_open();
  close();
  std::error_code ignored;
  std::filesystem::remove(temporary_, ignored);
}

void RecordWriter::File::close() {
  if (!open_) return;
  open_ = false;
  try {
    if (failed_) hdf5::drop_pending_writes(file_);
    time_.close();
    channels_.clear();
    profiles_.clear();
    events_.close();
    targets_.close();
    limits_.close();
    file_.close();
  } catch (const H5::Exception&) {
    // All was flushed before, or the failure has been reported.
  }
}

RecordWriter::RecordWriter(Settings settings) : file_(std::make_unique<File>(std::move(settings))) {}
RecordWriter::~RecordWriter() = default;
void RecordWriter::append(double time, std::span<const double> values, std::span<const double> profile_values) {
  file_->append(time, values, profile_values);
}
void RecordWriter::add_event(const EventRow& event) { file_->add_event(event); }
void RecordWriter::flush() { file_->flush(); }
std::string RecordWriter::finish(const Outcome& outcome) { return file_->finish(outcome); }
void RecordWriter::abandon() { file_->abandon(); }
std::size_t RecordWriter::rows() const { return file_->rows(); }

}  // namespace gaskettle

#include "record/record_reader.h"

#include <fmt/format.h>

#include <algorithm>
#include <filesystem>
#include <map>

#include "base/problems.h"
#include "record/hdf5_tools.hpp"
#include "record/record_table.hpp"

namespace gaskettle {
namespace {

constexpr std::int64_t newest_layout = 1;

void check_layout(const H5::Group& root, const std::string& path) {
  if (!root.attrExists("gaskettle_record")) {
    throw RecordError(path + ": is HDF5 but not a record of this program; give a file that a run has written");
  }
  const Attribute layout = hdf5::get_attribute(root, "gaskettle_record");
  const auto* number = std::get_if<std::int64_t>(&layout);
  if (!number || *number > newest_layout) {
    throw RecordError(path + ": was written by a newer version of the program, which reads it");
  }
}

H5::H5File open_record(const std::string& path) {
  std::error_code ignored;
  if (!std::filesystem::exists(path, ignored)) throw RecordError(path + ": no such file");
  if (std::filesystem::is_directory(path, ignored)) throw RecordError(path + ": is a folder, not a record");
  return hdf5::guarded(path, "open it as a record (an HDF5 file)", [&] {
    H5::H5File file(path, H5F_ACC_RDONLY);
    check_layout(file.openGroup("/"), path);
    return file;
  });
}

}  // namespace

class RecordReader::File {
public:
  template <class Action>
  auto guarded(const std::string& doing, Action&& action) const {
    return hdf5::guarded(path_, doing, std::forward<Action>(action));
  }

  explicit File(const std::string& path) : path_(path), file_(open_record(path)) {
    guarded("read its channels", [&] { read_layout(); });
  }

  /// Throws where there is no such channel.
  std::size_t number_of(const std::string& name) const {
    const auto found = numbers_.find(name);
    if (found == numbers_.end()) throw RecordError(unknown(name));
    return found->second;
  }

  std::string path_;
  H5::H5File file_;
  std::vector<ChannelInfo> channels_;
  std::vector<ProfileInfo> profiles_;
  std::map<std::string, std::size_t> numbers_;
  std::vector<double> time_;

private:
  void read_layout() {
    const H5::Group root = file_.openGroup("/");
    const H5::DataSet time = root.openDataSet("time");
    hsize_t rows = hdf5::row_count(time);
    for (const std::string& name : hdf5::dataset_names(root)) {
      const H5::DataSet dataset = root.openDataSet(name);
      if (hdf5::is_scale(dataset)) continue;
      rows = std::min(rows, hdf5::row_count(dataset));
      add(root, name, dataset);
    }
    time_ = hdf5::read_rows(time, 0, rows);
  }

  void add(const H5::Group& root, const std::string& name, const H5::DataSet& dataset) {
    const std::string units = hdf5::get_text(dataset, "units");
    const std::string long_name = hdf5::get_text(dataset, "long_name");
    if (dataset.getSpace().getSimpleExtentNdims() == 1) {
      numbers_[name] = channels_.size();
      channels_.push_back({name, units, long_name});
      return;
    }
    const std::string depth_name = hdf5::scale_name(dataset, 1);
    const H5::DataSet depth = root.openDataSet(depth_name);
    profiles_.push_back({name, units, long_name, depth_name, hdf5::read_rows(depth, 0, hdf5::row_count(depth))});
  }

  std::string unknown(const std::string& name) const {
    std::vector<std::string> known;
    for (const ChannelInfo& channel : channels_) known.push_back(channel.name);
    const std::string near = nearest_name(name, known);
    const std::string help =
        near.empty() ? fmt::format("it has {} channels", known.size()) : fmt::format("did you mean {}?", near);
    return fmt::format("{}: has no channel {}; {}", path_, name, help);
  }
};

RecordReader::RecordReader(const std::string& path) : file_(std::make_unique<File>(path)) {}
RecordReader::~RecordReader() = default;
RecordReader::RecordReader(RecordReader&&) noexcept = default;
RecordReader& RecordReader::operator=(RecordReader&&) noexcept = default;

const std::string& RecordReader::path() const { return file_->path_; }
const std::vector<ChannelInfo>& RecordReader::channels() const { return file_->channels_; }
const std::vector<ProfileInfo>& RecordReader::profiles() const { return file_->profiles_; }

std::vector<std::string> RecordReader::channel_names() const {
  std::vector<std::string> names;
  for (const ChannelInfo& channel : channels()) names.push_back(channel.name);
  return names;
}

bool RecordReader::has_channel(const std::string& name) const { return file_->numbers_.count(name) > 0; }

const ChannelInfo& RecordReader::channel_info(const std::string& name) const {
  return file_->channels_[file_->number_of(name)];
}

std::size_t RecordReader::rows() const { return file_->time_.size(); }
const std::vector<double>& RecordReader::time() const { return file_->time_; }

std::vector<double> RecordReader::channel(const std::string& name) const { return channel(name, 0, rows()); }

std::vector<double> RecordReader::channel(const std::string& name, std::size_t first, std::size_t count) const {
  file_->number_of(name);
  if (first > rows() || count > rows() - first) {
    throw RecordError(fmt::format("{}: rows {} to {} were asked for; it has {}", path(), first, first + count, rows()));
  }
  return file_->guarded("read " + name, [&] { return hdf5::read_rows(file_->file_.openDataSet(name), first, count); });
}

std::vector<double> RecordReader::profile(const std::string& name) const {
  std::vector<std::string> known;
  for (const ProfileInfo& info : profiles()) known.push_back(info.name);
  if (std::find(known.begin(), known.end(), name) == known.end()) {
    throw RecordError(fmt::format("{}: has no profile {}; it has: {}", path(), name,
                                  known.empty() ? "none" : fmt::format("{}", fmt::join(known, ", "))));
  }
  return file_->guarded("read " + name, [&] { return hdf5::read_rows(file_->file_.openDataSet(name), 0, rows()); });
}

std::vector<EventRow> RecordReader::events() const {
  return file_->guarded("read its events", [&] { return hdf5::read_events(file_->file_.openGroup("events")); });
}

Outcome RecordReader::outcome() const {
  return file_->guarded("read its outcome", [&] {
    const H5::Group group = file_->file_.openGroup("outcome");
    return Outcome{hdf5::read_targets(group.openGroup("targets")), hdf5::read_limits(group.openGroup("limits")),
                   hdf5::get_attributes(group)};
  });
}

Provenance RecordReader::provenance() const {
  return file_->guarded("read its provenance", [&] {
    const H5::Group group = file_->file_.openGroup("provenance");
    Provenance provenance;
    for (const auto& [name, value] : hdf5::get_attributes(group)) {
      if (const auto* text = std::get_if<std::string>(&value)) provenance.emplace_back(name, *text);
    }
    for (const std::string& name : hdf5::dataset_names(group)) {
      provenance.emplace_back(name, hdf5::read_long_text(group.openDataSet(name)));
    }
    return provenance;
  });
}

std::string RecordReader::identity() const {
  return file_->guarded("read its identity", [&] { return hdf5::get_text(file_->file_.openGroup("/"), "identity"); });
}

bool RecordReader::partial() const {
  return file_->guarded("read its outcome", [&] {
    return hdf5::get_attribute(file_->file_.openGroup("outcome"), "partial") != Attribute(std::int64_t{0});
  });
}

}  // namespace gaskettle

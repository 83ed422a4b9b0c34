/// Reads the record of one run, finished or partial.
#pragma once
#include <cstddef>
#include <memory>
#include <string>
#include <vector>

#include "record/record_data.h"

namespace gaskettle {

/// Layout: see record_writer.h. Channels are read when asked for. One thread makes, uses and destroys a reader.
/// Every function that reads throws RecordError.
class RecordReader {
public:
  /// Throws where there is no file, it is not HDF5, not a record of this program, or of a newer layout.
  explicit RecordReader(const std::string& path);
  ~RecordReader();
  RecordReader(RecordReader&&) noexcept;
  RecordReader& operator=(RecordReader&&) noexcept;

  const std::string& path() const;
  const std::vector<ChannelInfo>& channels() const;  ///< in the order written
  const std::vector<ProfileInfo>& profiles() const;
  std::vector<std::string> channel_names() const;
  bool has_channel(const std::string& name) const;
  /// Throws, with the nearest name, where there is none.
  const ChannelInfo& channel_info(const std::string& name) const;

  /// Rows that every channel has; a killed run may have written a block to some of its channels only.
  std::size_t rows() const;
  const std::vector<double>& time() const;  ///< s, strictly increasing
  std::vector<double> channel(const std::string& name) const;
  /// `count` rows from row `first` on.
  std::vector<double> channel(const std::string& name, std::size_t first, std::size_t count) const;
  /// Row after row, each as long as the profile's depths.
  std::vector<double> profile(const std::string& name) const;

  std::vector<EventRow> events() const;
  Outcome outcome() const;
  /// Short texts first, then the long ones.
  Provenance provenance() const;
  std::string identity() const;
  /// True for a run that was killed, interrupted or stopped early.
  bool partial() const;

private:
  class File;
  std::unique_ptr<File> file_;
};

}  // namespace gaskettle

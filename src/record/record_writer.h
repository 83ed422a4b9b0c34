/// Writes the record of one run: an HDF5 file that netCDF tools and xarray open as it is.
#pragma once
#include <cstddef>
#include <memory>
#include <span>
#include <string>
#include <vector>

#include "record/record_data.h"

namespace gaskettle {

/// Layout of the file:
/// - root: dimension scale `time` (s); a float64 dataset `part.quantity` a channel along it; a dataset
///   (time, depth) a profile, its depths a dimension scale of their own. `units`, `long_name` on each.
/// - `/events`: time, part, what, before, after along dimension `event`.
/// - `/outcome`: attributes; groups `targets` (name, time) and `limits` (name, extreme, extreme_time, margin,
///   crossed_time) along dimensions `target` and `limit`.
/// - `/provenance`: attributes; `model_text`, and any text over 32 kB, is a scalar dataset instead, which
///   keeps header listings short.
/// - root attributes: gaskettle_record = 1 (version of this layout), identity, and title and program_version
///   where the provenance has them.
///
/// The file is written as PATH.partial and renamed when finished. Rows go to it in blocks of at most 1024, so
/// memory does not grow with the run. It is flushed when made, when asked, and with a block when a second has passed:
/// a killed run leaves a readable file, as of its last flush, whose `/outcome` says partial = 1. (Unless killed
/// inside a flush, which takes below 1 ms at 100 channels.)
///
/// One thread makes, uses and destroys a writer. Every function throws RecordError.
class RecordWriter {
public:
  struct Settings {
    std::string path;
    bool overwrite = false;  ///< replace whatever regular file stands at the path
    std::vector<ChannelInfo> channels;
    std::vector<ProfileInfo> profiles;
    Provenance provenance;
    std::string identity;           ///< same model and settings: same text; such a record is replaced without asking
    std::size_t expected_rows = 0;  ///< a guess that sizes the chunks of the file; 0: not known
  };

  /// Refuses an existing file (at the path, or left at PATH.partial) that is not a record of the same identity,
  /// unless told to overwrite (what a run killed before its first flush has left is replaced); folders that are missing
  /// or not writable; a PATH.partial that another run is writing; names that are empty, doubled, reserved (`time`,
  /// `events`, `outcome`, `provenance`) or hold a slash.
  explicit RecordWriter(Settings settings);

  /// Writes what there is and closes, leaving PATH.partial, unless finished or abandoned.
  ~RecordWriter();
  RecordWriter(const RecordWriter&) = delete;
  RecordWriter& operator=(const RecordWriter&) = delete;

  /// One row: `values` in the order of the channels, `profile_values` the profiles one after the other.
  /// `time` (s) must be finite and above that of the row before.
  void append(double time, std::span<const double> values, std::span<const double> profile_values = {});

  void add_event(const EventRow& event);

  /// Writes what is buffered and hands it to the operating system.
  void flush();

  /// Writes the outcome, closes and renames onto the path, which it returns. `partial` is 0 unless the outcome's
  /// attributes say otherwise. A second call, or any other after it, throws.
  std::string finish(const Outcome& outcome);

  /// Closes and deletes the temporary file: nothing was computed that is worth keeping.
  void abandon();

  std::size_t rows() const;  ///< appended so far

private:
  class File;
  std::unique_ptr<File> file_;
};

}  // namespace gaskettle

// Internal to this floor and not installed (hence .hpp): the only header that sees HDF5.
#pragma once
#include <H5Cpp.h>

#include <span>
#include <string>
#include <utility>
#include <variant>
#include <vector>

#include "record/record_data.h"

namespace gaskettle::hdf5 {

/// Stops HDF5 from printing its errors; the innermost text of a failure is kept for explain().
void silence();

/// What to tell the user about an HDF5 failure while `doing` ("write the rows") with the file at `path`.
std::string explain(const std::string& path, const std::string& doing, const H5::Exception& failure);

/// Runs `action`, turning H5::Exception, which is not a std::exception, into RecordError.
template <class Action>
auto guarded(const std::string& path, const std::string& doing, Action&& action) -> decltype(action()) {
  silence();
  try {
    return action();
  } catch (const H5::Exception& failure) {
    throw RecordError(explain(path, doing, failure));
  }
}

/// A new file whose links and attributes keep the order they were made in.
H5::H5File create_file(const std::string& path);
/// Takes the disk space that a flush will need, from byte `taken` on, which moves on. A flush must not fail for want
/// of it: HDF5 1.10.8 cannot close a file after a failed flush and crashes, at once or when the program ends.
/// Throws RecordError naming `path`. On file systems that cannot promise space it does nothing.
void take_space(const H5::H5File& file, const std::string& path, hsize_t& taken);
/// After a failed write: what the library still holds back goes nowhere, so that closing does not try it again.
void drop_pending_writes(const H5::H5File& file);
H5::Group create_group(const H5::Group& parent, const std::string& name);

/// A dataset along a growing first dimension of no rows yet; `width` of 0: one dimension only.
H5::DataSet create_column(const H5::Group& group, const std::string& name, const H5::DataType& type, hsize_t chunk_rows,
                          hsize_t width = 0);
/// A dataset of fixed size that holds `values`.
H5::DataSet create_fixed(const H5::Group& group, const std::string& name, std::span<const double> values);
void create_long_text(const H5::Group& group, const std::string& name, const std::string& text);

/// Writes `count` rows at `first`, extending the dataset to end there. `data` is laid out as `memory_type` says.
void write_rows(H5::DataSet& dataset, const H5::DataType& memory_type, hsize_t first, hsize_t count, const void* data);
/// Reads `count` rows of doubles at `first`.
std::vector<double> read_rows(const H5::DataSet& dataset, hsize_t first, hsize_t count);
std::vector<std::string> read_texts(const H5::DataSet& dataset, hsize_t count);
std::string read_long_text(const H5::DataSet& dataset);
/// Length along the first dimension.
hsize_t row_count(const H5::DataSet& dataset);

/// UTF-8 text of any length, as a C string in memory.
H5::StrType text_type();

/// Writes or replaces an attribute.
void set_attribute(H5::H5Object& object, const std::string& name, const Attribute& value);
Attribute get_attribute(const H5::H5Object& object, const std::string& name);
/// Empty where there is none or it is no text.
std::string get_text(const H5::H5Object& object, const std::string& name);
/// Numbers and texts, in the order written.
Attributes get_attributes(const H5::H5Object& object);
/// Names of the datasets in a group, in the order written.
std::vector<std::string> dataset_names(const H5::Group& group);

/// Dimension scales as the "HDF5 Dimension Scale Specification" (The HDF Group) stores them. The attributes are
/// written here rather than through its H5DS functions because those rewrite a scale's whole list of references
/// at each attachment: quadratic time, noticed at a few thousand channels.
class ScaleBook {
public:
  /// Makes `dataset` a scale and returns its number.
  std::size_t add_scale(H5::DataSet& dataset, const std::string& name);
  /// Attaches one scale a dimension, given by their numbers.
  void attach(H5::DataSet& dataset, std::span<const std::size_t> scales);
  /// Writes which dataset uses which scale; once, after the last attach.
  void write_back_references();

private:
  struct Use {
    hobj_ref_t dataset;
    int dimension;
  };
  struct Scale {
    H5::DataSet dataset;
    std::vector<Use> uses;
  };
  std::vector<Scale> scales_;
};

bool is_scale(const H5::DataSet& dataset);
/// Name, without its folder, of the scale attached to a dimension; empty where there is none.
std::string scale_name(const H5::DataSet& dataset, std::size_t dimension);

}  // namespace gaskettle::hdf5

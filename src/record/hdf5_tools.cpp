#include "record/hdf5_tools.hpp"

#include <fcntl.h>
#include <fmt/format.h>
#include <sys/mman.h>
#include <unistd.h>

#include <array>
#include <cerrno>
#include <cstring>
#include <limits>

namespace gaskettle::hdf5 {
namespace {

// Not H5S_UNLIMITED: for each dataset along an unlimited scale h5netcdf asks all others along it for their length,
// which took minutes at 1000 channels; a bounded scale it takes at its word.
constexpr hsize_t most_rows = hsize_t{1} << 48;

// The first failure since silence(), from HDF5's error callback: by the time an exception is caught, handles closed
// on the way have cleared the library's own stack or failed in turn. HDF5 keeps its stack a thread, too.
thread_local std::string first_failure;

herr_t keep_innermost(unsigned depth, const H5E_error2_t* error, void*) {
  if (depth == 0 && error->desc && first_failure.empty()) first_failure = error->desc;
  return 0;
}

herr_t on_error(hid_t stack, void*) noexcept { return H5Ewalk2(stack, H5E_WALK_UPWARD, keep_innermost, nullptr); }

// The system's own words out of "file write failed: ..., error message = 'No space left on device', ...".
std::string system_words(const std::string& text) {
  const std::string mark = "error message = '";
  const auto start = text.find(mark);
  if (start == std::string::npos) return text;
  const auto from = start + mark.size();
  return text.substr(from, text.find('\'', from) - from);
}

H5::LinkCreatPropList utf8_links() {
  H5::LinkCreatPropList links;
  links.setCharEncoding(H5T_CSET_UTF8);
  return links;
}

void keep_order(hid_t creation_list) {
  H5Pset_link_creation_order(creation_list, H5P_CRT_ORDER_TRACKED | H5P_CRT_ORDER_INDEXED);
  H5Pset_attr_creation_order(creation_list, H5P_CRT_ORDER_TRACKED | H5P_CRT_ORDER_INDEXED);
}

// Holds metadata in memory until a flush. Written out piecemeal between flushes, it would refer to parts of the file
// that are not there yet, and a killed program would leave a file that does not open. It is small: some kB a channel.
void keep_metadata(hid_t access_list) {
  H5AC_cache_config_t config;
  config.version = H5AC__CURR_CACHE_CONFIG_VERSION;
  if (H5Pget_mdc_config(access_list, &config) < 0) return;
  config.evictions_enabled = false;
  config.incr_mode = H5C_incr__off;
  config.flash_incr_mode = H5C_flash_incr__off;
  config.decr_mode = H5C_decr__off;
  H5Pset_mdc_config(access_list, &config);
}

// The open file underneath; null where it is not a plain one.
const int* descriptor_of(const H5::H5File& file) {
  void* handle = nullptr;
  return H5Fget_vfd_handle(file.getId(), H5P_DEFAULT, &handle) < 0 ? nullptr : static_cast<const int*>(handle);
}

H5::StrType fixed_text_type(std::size_t length) {
  H5::StrType type(H5::PredType::C_S1, length + 1);
  type.setCset(H5T_CSET_UTF8);
  return type;
}

// Rows `first` to `first + count` of the file, whatever the width.
H5::DataSpace select_rows(const H5::DataSet& dataset, hsize_t first, hsize_t count, std::array<hsize_t, 2>& size) {
  H5::DataSpace space = dataset.getSpace();
  size = {0, 1};
  space.getSimpleExtentDims(size.data());
  const std::array<hsize_t, 2> start = {first, 0};
  size[0] = count;
  space.selectHyperslab(H5S_SELECT_SET, size.data(), start.data());
  return space;
}

}  // namespace

void silence() {
  H5Eset_auto2(H5E_DEFAULT, on_error, nullptr);
  first_failure.clear();
}

std::string explain(const std::string& path, const std::string& doing, const H5::Exception& failure) {
  const std::string detail = first_failure.empty() ? failure.getDetailMsg() : system_words(first_failure);
  std::string help;
  if (first_failure.find("lock file") != std::string::npos) {
    help =
        "; another program may have it open, or its file system knows no locks (then set "
        "HDF5_USE_FILE_LOCKING=FALSE)";
  } else if (first_failure.find("truncated file") != std::string::npos) {
    help = "; its end is missing, so copy it again or repeat the run";
  } else if (first_failure.find("signature") != std::string::npos) {
    help = "; give a file that a run has written";
  }
  return fmt::format("{}: could not {}: {}{}", path, doing, detail, help);
}

H5::H5File create_file(const std::string& path) {
  H5::FileCreatPropList creation;
  keep_order(creation.getId());
  H5::FileAccPropList access;
  // 1.8: wide attributes (one reference a channel on `time`) without the mark of newer formats that makes a file
  // left by a killed program refuse to open.
  access.setLibverBounds(H5F_LIBVER_V18, H5F_LIBVER_V18);
  keep_metadata(access.getId());
  return H5::H5File(path, H5F_ACC_EXCL, creation, access);
}

void take_space(const H5::H5File& file, const std::string& path, hsize_t& taken) {
  const int* descriptor = descriptor_of(file);
  const hsize_t size = file.getFileSize();
  if (!descriptor || size <= taken) return;
  const int status = fallocate(*descriptor, 0, static_cast<off_t>(taken), static_cast<off_t>(size - taken));
  if (status != 0 && (errno == ENOSPC || errno == EDQUOT || errno == EFBIG)) {
    throw RecordError(fmt::format("{}: could not write the record: {}", path, std::strerror(errno)));
  }
  taken = size;
}

void drop_pending_writes(const H5::H5File& file) {
  const int* descriptor = descriptor_of(file);
  const int sink = memfd_create("gaskettle", MFD_CLOEXEC);
  if (sink < 0) return;
  if (descriptor) dup2(sink, *descriptor);
  close(sink);
}

H5::Group create_group(const H5::Group& parent, const std::string& name) {
  const hid_t creation = H5Pcreate(H5P_GROUP_CREATE);
  keep_order(creation);
  const hid_t id = H5Gcreate2(parent.getId(), name.c_str(), H5P_DEFAULT, creation, H5P_DEFAULT);
  H5Pclose(creation);
  if (id < 0) throw H5::GroupIException("create_group", "group " + name);
  H5::Group group(id);  // counts one more use of the handle
  H5Gclose(id);
  return group;
}

H5::DataSet create_column(const H5::Group& group, const std::string& name, const H5::DataType& type, hsize_t chunk_rows,
                          hsize_t width) {
  const int rank = width > 0 ? 2 : 1;
  const std::array<hsize_t, 2> size = {0, width};
  const std::array<hsize_t, 2> most = {most_rows, width};
  const std::array<hsize_t, 2> chunk = {chunk_rows, width};
  H5::DSetCreatPropList creation;
  creation.setChunk(rank, chunk.data());
  H5::DSetAccPropList access;
  if (type.getClass() == H5T_FLOAT) {
    // Readers show it for rows that a killed run wrote to other columns only.
    const double missing = std::numeric_limits<double>::quiet_NaN();
    creation.setFillValue(H5::PredType::NATIVE_DOUBLE, &missing);
    creation.setFillTime(H5D_FILL_TIME_NEVER);
    // Rows come in whole blocks: straight to the file, or each channel would hold a cache of 1 MB.
    access.setChunkCache(1, 0, 0.0);
  }
  return group.createDataSet(name, type, H5::DataSpace(rank, size.data(), most.data()), creation, access, utf8_links());
}

H5::DataSet create_fixed(const H5::Group& group, const std::string& name, std::span<const double> values) {
  const hsize_t size = values.size();
  H5::DataSet dataset = group.createDataSet(name, H5::PredType::IEEE_F64LE, H5::DataSpace(1, &size),
                                            H5::DSetCreatPropList::DEFAULT, H5::DSetAccPropList::DEFAULT, utf8_links());
  dataset.write(values.data(), H5::PredType::NATIVE_DOUBLE);
  return dataset;
}

void create_long_text(const H5::Group& group, const std::string& name, const std::string& text) {
  H5::DataSet dataset = group.createDataSet(name, text_type(), H5::DataSpace(H5S_SCALAR),
                                            H5::DSetCreatPropList::DEFAULT, H5::DSetAccPropList::DEFAULT, utf8_links());
  const char* start = text.c_str();
  dataset.write(&start, text_type());
}

void write_rows(H5::DataSet& dataset, const H5::DataType& memory_type, hsize_t first, hsize_t count, const void* data) {
  std::array<hsize_t, 2> size = {0, 1};
  const int rank = dataset.getSpace().getSimpleExtentDims(size.data());
  size[0] = first + count;
  dataset.extend(size.data());
  const H5::DataSpace file = select_rows(dataset, first, count, size);
  dataset.write(data, memory_type, H5::DataSpace(rank, size.data()), file);
}

std::vector<double> read_rows(const H5::DataSet& dataset, hsize_t first, hsize_t count) {
  if (count == 0) return {};
  std::array<hsize_t, 2> size;
  const H5::DataSpace file = select_rows(dataset, first, count, size);
  std::vector<double> values(size[0] * size[1]);
  dataset.read(values.data(), H5::PredType::NATIVE_DOUBLE, H5::DataSpace(file.getSimpleExtentNdims(), size.data()),
               file);
  return values;
}

std::vector<std::string> read_texts(const H5::DataSet& dataset, hsize_t count) {
  if (count == 0) return {};
  std::array<hsize_t, 2> size;
  const H5::DataSpace file = select_rows(dataset, 0, count, size);
  const H5::DataSpace memory(1, &count);
  std::vector<char*> raw(count, nullptr);
  dataset.read(raw.data(), text_type(), memory, file);
  std::vector<std::string> texts;
  for (const char* text : raw) texts.emplace_back(text ? text : "");
  H5Dvlen_reclaim(text_type().getId(), memory.getId(), H5P_DEFAULT, raw.data());
  return texts;
}

std::string read_long_text(const H5::DataSet& dataset) {
  std::string text;
  dataset.read(text, dataset.getStrType());
  return text;
}

hsize_t row_count(const H5::DataSet& dataset) {
  std::array<hsize_t, 2> size = {0, 0};
  dataset.getSpace().getSimpleExtentDims(size.data());
  return size[0];
}

H5::StrType text_type() {
  H5::StrType type(H5::PredType::C_S1, H5T_VARIABLE);
  type.setCset(H5T_CSET_UTF8);
  return type;
}

void set_attribute(H5::H5Object& object, const std::string& name, const Attribute& value) {
  if (object.attrExists(name)) object.removeAttr(name);
  const H5::DataSpace scalar(H5S_SCALAR);
  if (const auto* number = std::get_if<double>(&value)) {
    object.createAttribute(name, H5::PredType::IEEE_F64LE, scalar).write(H5::PredType::NATIVE_DOUBLE, number);
  } else if (const auto* count = std::get_if<std::int64_t>(&value)) {
    object.createAttribute(name, H5::PredType::STD_I64LE, scalar).write(H5::PredType::NATIVE_INT64, count);
  } else {
    const auto& text = std::get<std::string>(value);
    const H5::StrType type = fixed_text_type(text.size());
    object.createAttribute(name, type, scalar).write(type, text.c_str());
  }
}

Attribute get_attribute(const H5::H5Object& object, const std::string& name) {
  const H5::Attribute attribute = object.openAttribute(name);
  switch (attribute.getTypeClass()) {
    case H5T_INTEGER: {
      std::int64_t count = 0;
      attribute.read(H5::PredType::NATIVE_INT64, &count);
      return count;
    }
    case H5T_FLOAT: {
      double number = 0;
      attribute.read(H5::PredType::NATIVE_DOUBLE, &number);
      return number;
    }
    case H5T_STRING: {
      std::string text;
      attribute.read(attribute.getStrType(), text);
      return text;
    }
    default:
      throw H5::AttributeIException("get_attribute", name + " is neither a number nor a text");
  }
}

std::string get_text(const H5::H5Object& object, const std::string& name) {
  if (!object.attrExists(name)) return {};
  const Attribute value = get_attribute(object, name);
  const auto* text = std::get_if<std::string>(&value);
  return text ? *text : std::string();
}

Attributes get_attributes(const H5::H5Object& object) {
  Attributes attributes;
  const int count = object.getNumAttrs();
  for (int i = 0; i < count; ++i) {
    const std::string name = object.openAttribute(static_cast<unsigned>(i)).getName();
    attributes.emplace_back(name, get_attribute(object, name));
  }
  return attributes;
}

std::vector<std::string> dataset_names(const H5::Group& group) {
  std::vector<std::string> names;
  const auto note = [](hid_t parent, const char* name, const H5L_info_t*, void* list) noexcept -> herr_t {
    H5O_info_t info;
    if (H5Oget_info_by_name2(parent, name, &info, H5O_INFO_BASIC, H5P_DEFAULT) < 0) return -1;
    if (info.type == H5O_TYPE_DATASET) static_cast<std::vector<std::string>*>(list)->emplace_back(name);
    return 0;
  };
  if (H5Literate(group.getId(), H5_INDEX_CRT_ORDER, H5_ITER_INC, nullptr, note, &names) < 0) {
    throw H5::GroupIException("dataset_names", "cannot list the group");
  }
  return names;
}

}  // namespace gaskettle::hdf5

#include "record/record_place.h"

#include <fcntl.h>
#include <fmt/format.h>
#include <sys/file.h>
#include <unistd.h>

#include <cerrno>
#include <cstring>
#include <filesystem>
#include <fstream>
#include <optional>

#include "record/hdf5_tools.hpp"
#include "record/record_data.h"

namespace gaskettle {
namespace {

namespace fs = std::filesystem;

// Nothing where the file is not a record.
std::optional<std::string> identity_of(const std::string& path) {
  hdf5::silence();
  try {
    const H5::H5File file(path, H5F_ACC_RDONLY);
    if (!file.attrExists("gaskettle_record")) return std::nullopt;
    return hdf5::get_text(file, "identity");
  } catch (const H5::Exception&) {
    return std::nullopt;
  }
}

void check_folder(const std::string& path) {
  fs::path folder = fs::path(path).parent_path();
  if (folder.empty()) folder = ".";
  std::error_code ignored;
  if (!fs::is_directory(folder, ignored)) {
    throw RecordError(fmt::format("{}: the folder {} does not exist; create it first", path, folder.string()));
  }
  if (access(folder.c_str(), W_OK | X_OK) != 0) {
    throw RecordError(
        fmt::format("{}: cannot write in the folder {}: {}", path, folder.string(), std::strerror(errno)));
  }
}

void check_replaceable(const std::string& path, const std::string& identity, bool overwrite) {
  std::error_code ignored;
  if (!fs::exists(path, ignored)) return;
  if (!fs::is_regular_file(path, ignored)) {
    throw RecordError(fmt::format("{}: exists and is not a regular file; choose another name", path));
  }
  if (overwrite) return;
  const auto found = identity_of(path);
  if (found && !identity.empty() && *found == identity) return;
  const char* what = found ? "holds the record of another model or other settings" : "exists and is not a record";
  throw RecordError(fmt::format("{}: {}; choose another name or ask for overwriting (--overwrite)", path, what));
}

// True for what a program killed while it made or flushed a record leaves: HDF5 that does not open, or nothing but
// the zeros of a beginning that was never written.
bool is_wreck(const std::string& path) {
  const std::string signature = "\x89HDF\r\n\x1a\n";
  std::string start(signature.size(), '\0');
  std::ifstream(path, std::ios::binary).read(start.data(), static_cast<std::streamsize>(start.size()));
  if (start == signature) {
    hdf5::silence();
    try {
      const H5::H5File file(path, H5F_ACC_RDONLY);
      return false;
    } catch (const H5::Exception&) {
      return true;
    }
  }
  return start.find_first_not_of('\0') == std::string::npos;
}

// HDF5 holds an exclusive lock on a file that it writes, a shared one on a file that it reads.
void check_unused(const std::string& path) {
  const int file = open(path.c_str(), O_RDONLY | O_CLOEXEC);
  if (file < 0) return;
  const bool used = flock(file, LOCK_SH | LOCK_NB) != 0 && errno == EWOULDBLOCK;
  close(file);
  if (used) {
    throw RecordError(fmt::format("{}: another run is writing it; wait for it or choose another name", path));
  }
}

}  // namespace

std::string partial_path(const std::string& path) { return path + ".partial"; }

void claim_place(const std::string& path, const std::string& identity, bool overwrite) {
  if (path.empty()) throw RecordError("a record needs a file name");
  check_folder(path);
  check_replaceable(path, identity, overwrite);
  const std::string partial = partial_path(path);
  check_unused(partial);
  check_replaceable(partial, identity, overwrite || is_wreck(partial));
  std::error_code failed;
  fs::remove(partial, failed);
  if (failed) throw RecordError(fmt::format("{}: cannot delete: {}", partial, failed.message()));
}

}  // namespace gaskettle

/// Version and build of the program, set by the build from one place (CMakeLists.txt).
#pragma once

namespace gaskettle {
extern const char* const program_version;
extern const char* const source_revision;
extern const char* const build_description;
}  // namespace gaskettle

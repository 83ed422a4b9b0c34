/// Whether a record may be written at a path.
#pragma once
#include <string>

namespace gaskettle {

/// The temporary name a record has while it is written.
std::string partial_path(const std::string& path);

/// Makes room for a new record at `path`: refuses (RecordError) what must not be replaced there or at the temporary
/// name, a missing or unwritable folder, and a temporary file that another program is writing; deletes a temporary
/// file left by a killed run. `identity`: that of the record to come; empty matches no record.
void claim_place(const std::string& path, const std::string& identity, bool overwrite);

}  // namespace gaskettle

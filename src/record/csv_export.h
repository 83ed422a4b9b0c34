/// A record as comma-separated text.
#pragma once
#include <ostream>
#include <string>
#include <vector>

#include "record/record_reader.h"

namespace gaskettle {

/// Writes one header line, `time [s],chamber.temperature [K],...`, and one line a row; fields are quoted as
/// RFC 4180 (Y. Shafranovich, "Common Format and MIME Type for CSV Files", 2005) says, lines end in a line feed.
/// Numbers have the fewest digits that read back as the same double.
///
/// `channels`: those wanted, in that order; empty: all. `every` (s): 0 writes the rows of the record; otherwise
/// rows stand at the multiples of `every` from the first to the last time, interpolated linearly between the
/// record's rows. A multiple that falls on an event has the values just after it.
///
/// Throws RecordError for an unknown channel (with the nearest name) and an interval that is negative or not finite.
void export_csv(const RecordReader& record, std::ostream& out, const std::vector<std::string>& channels = {},
                double every = 0);

}  // namespace gaskettle

/// Words of the reference that belong to no key: channels of a record, forms of a varying value.
#pragma once
#include <string>
#include <vector>

namespace gaskettle {

struct Word {
  const char* name;
  const char* meaning;
  const char* units;  ///< UDUNITS text of a channel; how a varying value is written
};

/// Quantities of the channels PART.QUANTITY.
const std::vector<Word>& channel_words();
/// What may stand for a value that varies in time.
const std::vector<Word>& varying_words();
/// A pressure unit without abs or gauge, as people look it up.
bool is_plain_pressure_unit(const std::string& word);

}  // namespace gaskettle

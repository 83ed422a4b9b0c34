/// The reference: what `explain` prints of keys, gases, materials, films, units and quantities.
#pragma once
#include <optional>
#include <string>

namespace gaskettle {

/// The reference of one word; nullopt where nothing of that name is known. Empty word: the overview.
std::optional<std::string> explain(const std::string& word);
/// The nearest word that `explain` knows, or empty.
std::string nearest_word(const std::string& word);

}  // namespace gaskettle

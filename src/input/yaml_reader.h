/// Reads YAML text into the plain tree of model/document.h, and refuses what a
/// model file has no use for. The only user of the YAML library.
///
/// Language: YAML 1.2 (Ben-Kiki, Evans, döt Net, "YAML Ain't Markup Language",
/// 3rd edition, 2009), one document a text, as the library understands it.
/// Narrower on purpose, each with its own message:
///   - a key is a scalar and stands once in its map; merge keys (`<<`), tags (`!...`) and directives (`%...`) are
///   refused;
///   - a tab never indents, not even inside a text of several lines;
///   - UTF-8 only, no control characters, written or as an escape;
///   - the sizes below, which also bound what aliases may expand to.
/// Values keep their text: `010`, `.nan` and `no` mean nothing here.
#pragma once
#include <cstddef>
#include <optional>
#include <string>

#include "base/problems.h"
#include "model/document.h"

namespace gaskettle {

/// The bounds of a YAML text; beyond one of them it is refused.
struct YamlLimits {
  static constexpr std::size_t text_bytes = 4U << 20;       ///< of the whole text
  static constexpr std::size_t scalar_bytes = 64U << 10;    ///< of one key or value
  static constexpr std::size_t depth = 64;                  ///< maps and lists inside each other
  static constexpr std::size_t nodes = 200'000;             ///< values, aliases counted as what they stand for
  static constexpr std::size_t expanded_bytes = 16U << 20;  ///< text of all values, aliases likewise
};

/// The bytes of a file, or nothing and a problem "cannot read ..." at `place`
/// (the file itself where `place` names none): no such file, a folder, not
/// permitted, above YamlLimits::text_bytes.
std::optional<std::string> read_text_file(const std::string& path, Place place, Problems& problems);

/// The tree of a YAML text. `file_name` is what messages call it. Lines and columns count
/// from 1, columns in characters (not bytes); an empty value stands at its key, an empty item at its list,
/// an alias at what it stands for.
/// Wrong text adds at least one problem. Where the text can still be followed (a key
/// twice, a tag) the tree comes without the offending entry, so that the rest can be
/// checked too; else the root is Node::Kind::missing. Throws std::bad_alloc only.
Node read_yaml_text(const std::string& text, std::string file_name, Problems& problems);

/// read_text_file, then read_yaml_text.
Node read_yaml_file(const std::string& path, Problems& problems);

}  // namespace gaskettle

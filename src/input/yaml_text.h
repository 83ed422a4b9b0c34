/// A YAML text made ready for the library: line breaks unified, characters checked,
/// positions turned into places. Knows characters and lines, not YAML's structure.
#pragma once
#include <cstddef>
#include <cstdint>
#include <memory>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "base/problems.h"

namespace gaskettle {

/// A byte that no model text may hold, and what is wrong with it.
struct BadCharacter {
  std::size_t offset;
  std::string what;
};

/// The first byte that is not UTF-8 (RFC 3629: shortest form, no surrogates, up to
/// U+10FFFF) or begins a character that cannot be seen: all controls but line feed,
/// tab and U+0085, the byte order mark, U+FFFE and U+FFFF.
std::optional<BadCharacter> find_bad_character(std::string_view text);

class YamlText {
public:
  /// Drops a byte order mark; CR LF and CR become LF; a last line without LF gets one.
  YamlText(const std::string& text, std::string file_name);

  /// Reports bad characters, tabs that indent, directives. True where there are none.
  bool check(Problems& problems) const;

  const std::string& bytes() const { return bytes_; }
  /// What follows a position given in zero-based line and byte within the line; beyond the end, nothing.
  std::string_view from(int line, int byte) const;
  /// The same position as a person counts: from 1, and in characters.
  Place place(int line, int byte) const;
  Place start() const { return place(0, 0); }

private:
  std::size_t offset(int line, int byte) const;
  bool check_lines(Problems& problems) const;

  std::string bytes_;
  std::shared_ptr<const std::string> file_;
  std::vector<std::size_t> line_starts_;
  bool completed_ = false;  ///< the last line had no line break of its own
  /// How many bytes before each offset continue a character; empty for an ASCII text.
  std::vector<std::uint32_t> continuations_;
};

}  // namespace gaskettle

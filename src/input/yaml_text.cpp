#include "input/yaml_text.h"

#include <fmt/format.h>

#include <algorithm>

namespace gaskettle {
namespace {

constexpr std::uint32_t not_utf8 = 0xFFFFFFFF;

struct Character {
  std::uint32_t code = not_utf8;
  std::size_t bytes = 1;
};

bool continues(char c) { return (static_cast<unsigned char>(c) & 0xC0U) == 0x80U; }

// RFC 3629, section 3 and 4.
Character decode(std::string_view text, std::size_t at) {
  const auto lead = static_cast<unsigned char>(text[at]);
  if (lead < 0x80) return {lead, 1};
  const std::size_t length = lead >= 0xF0 ? 4 : lead >= 0xE0 ? 3 : 2;
  if (lead < 0xC2 || lead > 0xF4 || at + length > text.size()) return {};
  std::uint32_t code = lead & (0xFFU >> (length + 1));
  for (std::size_t i = 1; i < length; ++i) {
    if (!continues(text[at + i])) return {};
    code = (code << 6U) | (static_cast<unsigned char>(text[at + i]) & 0x3FU);
  }
  static constexpr std::uint32_t least[] = {0, 0, 0x80, 0x800, 0x10000};
  const bool surrogate = code >= 0xD800 && code <= 0xDFFF;
  if (code < least[length] || surrogate || code > 0x10FFFF) return {};
  return {code, length};
}

bool cannot_be_seen(std::uint32_t code) {
  if (code == '\n' || code == '\t' || code == 0x85) return false;
  return code < 0x20 || (code >= 0x7F && code <= 0x9F) || code == 0xFEFF || code == 0xFFFE || code == 0xFFFF;
}

// The library tells a key without its ':' from one without a value only if a line break follows.
std::string unify(const std::string& text) {
  const bool marked = text.rfind("\xEF\xBB\xBF", 0) == 0;
  std::string out;
  out.reserve(text.size() + 1);
  for (std::size_t i = marked ? 3 : 0; i < text.size(); ++i) {
    if (text[i] != '\r')
      out += text[i];
    else if (i + 1 == text.size() || text[i + 1] != '\n')
      out += '\n';
  }
  if (!out.empty() && out.back() != '\n') out += '\n';
  return out;
}

}  // namespace

std::optional<BadCharacter> find_bad_character(std::string_view text) {
  for (std::size_t at = 0; at < text.size();) {
    const Character c = decode(text, at);
    if (c.code == not_utf8)
      return BadCharacter{
          at, fmt::format("byte 0x{:02X} is not UTF-8; save the text as UTF-8", static_cast<unsigned char>(text[at]))};
    if (cannot_be_seen(c.code))
      return BadCharacter{at, fmt::format("control or invisible character U+{:04X}; take it out", c.code)};
    at += c.bytes;
  }
  return std::nullopt;
}

YamlText::YamlText(const std::string& text, std::string file_name)
    : bytes_(unify(text)), file_(std::make_shared<const std::string>(std::move(file_name))) {
  line_starts_.push_back(0);
  completed_ = !text.empty() && text.back() != '\n' && text.back() != '\r';
  bool ascii = true;
  for (std::size_t i = 0; i < bytes_.size(); ++i) {
    if (bytes_[i] == '\n') line_starts_.push_back(i + 1);
    if (static_cast<unsigned char>(bytes_[i]) >= 0x80) ascii = false;
  }
  if (ascii) return;
  continuations_.reserve(bytes_.size() + 1);
  continuations_.push_back(0);
  for (const char c : bytes_) continuations_.push_back(continuations_.back() + (continues(c) ? 1U : 0U));
}

// The library may point one past a line's or the text's end, or nowhere (-1).
std::size_t YamlText::offset(int line, int byte) const {
  const auto row = std::min(static_cast<std::size_t>(std::max(line, 0)), line_starts_.size() - 1);
  return std::min(line_starts_[row] + static_cast<std::size_t>(std::max(byte, 0)), bytes_.size());
}

std::string_view YamlText::from(int line, int byte) const {
  return std::string_view(bytes_).substr(offset(line, byte));
}

Place YamlText::place(int line, int byte) const {
  const auto row = std::min(static_cast<std::size_t>(std::max(line, 0)), line_starts_.size() - 1);
  // The line break that `unify` added begins no line of the writer's.
  if (completed_ && row > 0 && line_starts_[row] == bytes_.size())
    return place(static_cast<int>(row) - 1, static_cast<int>(bytes_.size() - 1 - line_starts_[row - 1]));
  const std::size_t at = offset(line, byte);
  std::size_t column = at - line_starts_[row];
  if (!continuations_.empty()) column -= continuations_[at] - continuations_[line_starts_[row]];
  return {file_, static_cast<int>(row) + 1, static_cast<int>(column) + 1};
}

bool YamlText::check(Problems& problems) const {
  const auto bad = find_bad_character(bytes_);
  if (!bad) return check_lines(problems);
  // Only the first: a file that is no text at all would have thousands.
  const auto next = std::upper_bound(line_starts_.begin(), line_starts_.end(), bad->offset);
  const auto line = static_cast<int>(next - line_starts_.begin()) - 1;
  problems.add(place(line, static_cast<int>(bad->offset - line_starts_[static_cast<std::size_t>(line)])), bad->what);
  return false;
}

// What the library would pass over or misread without a word of its own.
bool YamlText::check_lines(Problems& problems) const {
  bool good = true;
  for (std::size_t i = 0; i < line_starts_.size(); ++i) {
    const std::size_t begin = line_starts_[i];
    const std::size_t end = i + 1 < line_starts_.size() ? line_starts_[i + 1] - 1 : bytes_.size();
    const std::string_view line = std::string_view(bytes_).substr(begin, end - begin);
    const std::size_t content = std::min(line.find_first_not_of(" \t"), line.size());
    const std::size_t tab = line.substr(0, content).find('\t');
    if (tab != std::string_view::npos && content < line.size() && line[content] != '#') {
      problems.add(place(static_cast<int>(i), static_cast<int>(tab)), "a tab in the indentation; indent with spaces");
      good = false;
    }
    if (line.starts_with('%')) {
      problems.add(place(static_cast<int>(i), 0),
                   "a line that begins with '%' is a YAML directive, which is not supported; put text in quotes");
      good = false;
    }
  }
  return good;
}

}  // namespace gaskettle

#include "input/overrides.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <charconv>
#include <memory>
#include <vector>

#include "input/yaml_reader.h"

namespace gaskettle {
namespace {

constexpr const char* version_key = "gaskettle";

std::string trimmed(const std::string& text) {
  const std::size_t first = text.find_first_not_of(" \t\r\n");
  if (first == std::string::npos) return {};
  return text.substr(first, text.find_last_not_of(" \t\r\n") - first + 1);
}

std::vector<std::string> split(const std::string& path) {
  std::vector<std::string> keys;
  std::size_t begin = 0;
  for (std::size_t dot = path.find('.'); dot != std::string::npos; dot = path.find('.', begin)) {
    keys.push_back(path.substr(begin, dot - begin));
    begin = dot + 1;
  }
  keys.push_back(path.substr(begin));
  return keys;
}

// "heaters.element", the part of the path already walked.
std::string walked(const std::vector<std::string>& keys, std::size_t count) {
  return count == 0 ? "the model" : fmt::format("'{}'", fmt::join(keys.begin(), keys.begin() + count, "."));
}

std::string missing_key(const Node& map, const std::vector<std::string>& keys, std::size_t at) {
  std::string message = fmt::format("{} has no '{}'", walked(keys, at), keys[at]);
  const std::string near = nearest_name(keys[at], map.keys());
  if (!near.empty()) return message + fmt::format("; did you mean '{}'?", near);
  if (map.entries.empty())
    message += "; it is empty";
  else if (map.entries.size() <= 20)
    message += fmt::format("; it has: {}", fmt::join(map.keys(), ", "));
  return message + fmt::format("; to add it, set '{}' as a whole", fmt::join(keys.begin(), keys.begin() + at + 1, "."));
}

// The item a number names, or nullptr and a problem.
Node* item_of(Node& list, const std::vector<std::string>& keys, std::size_t at, std::string& wrong) {
  std::size_t number = 0;
  const char* end = keys[at].data() + keys[at].size();
  const auto parsed = std::from_chars(keys[at].data(), end, number);
  const bool is_number = parsed.ec == std::errc() && parsed.ptr == end;
  if (is_number && number < list.items.size()) return &list.items[number];
  const std::string range =
      list.items.empty() ? "it has no items" : fmt::format("its items are 0 to {}", list.items.size() - 1);
  wrong = fmt::format("{} is a list and '{}' is none of its items; {}", walked(keys, at), keys[at], range);
  return nullptr;
}

// One step down; nullptr and the reason where it leads nowhere.
Node* step(Node& from, const std::vector<std::string>& keys, std::size_t at, std::string& wrong) {
  if (from.is_list()) return item_of(from, keys, at, wrong);
  if (from.is_scalar()) {
    wrong = fmt::format("{} is the value '{}', it has no '{}'", walked(keys, at), from.text, keys[at]);
    return nullptr;
  }
  Node* next = from.find(keys[at]);
  if (!next) wrong = missing_key(from, keys, at);
  return next;
}

// A section that is one map, not a map of names, may be left out of a model: setting a key of it writes it.
void open_single_section(Node& root, const std::vector<std::string>& keys, const Place& place) {
  if (!root.is_map() || keys.size() < 2 || root.find(keys.front()) != nullptr) return;
  if (keys.front() != "surroundings" && keys.front() != "run") return;
  Node section;
  section.kind = Node::Kind::map;
  section.place = place;
  root.entries.push_back({keys.front(), place, section});
}

std::string why_not_a_path(const std::vector<std::string>& keys) {
  if (keys.front() == version_key && keys.size() == 1) return "the version of the format is not for setting";
  for (const std::string& key : keys)
    if (key.empty()) return "a path is keys joined by single dots, as in heaters.element.rating";
  return {};
}

// Whether a scalar could end early or mean something else inside [ ] or { }. Numbers with
// units and names stay bare; anything less plain is quoted.
bool needs_quotes(const Node& node) {
  const std::string& text = node.text;
  if (node.quoted || text.empty() || trimmed(text) != text) return true;
  if (text == "null" || text == "Null" || text == "NULL") return true;
  for (const char c : text) {
    const bool letter = (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || (c >= '0' && c <= '9') || (c & 0x80) != 0;
    if (!letter && std::string_view(" ._/+-*^%()=").find(c) == std::string_view::npos) return true;
  }
  const bool indicator = std::string_view("*%").find(text.front()) != std::string_view::npos;
  return indicator || text.starts_with("---") || text == "-" || text.starts_with("- ");
}

std::string quoted(const std::string& text) {
  std::string out = "\"";
  for (const char c : text) {
    if (c == '\n')
      out += "\\n";
    else if (c == '\t')
      out += "\\t";
    else if (c == '"' || c == '\\')
      (out += '\\') += c;
    else
      out += c;
  }
  return out + '"';
}

std::string key_text(const std::string& key) {
  Node node;
  node.kind = Node::Kind::scalar;
  node.text = key;
  return flow_text(node);
}

}  // namespace

std::optional<Override> parse_override(const std::string& argument, Problems& problems) {
  const std::size_t equals = argument.find('=');
  Override change;
  change.path = trimmed(argument.substr(0, equals));
  const std::string file = "--set " + change.path;
  change.place = {std::make_shared<const std::string>(file), 1, 1};
  if (equals == std::string::npos || change.path.empty()) {
    problems.add(change.place, fmt::format("'{}' is not PATH=VALUE, as in heaters.element.rating=8 kW", argument));
    return std::nullopt;
  }
  change.text = trimmed(argument.substr(equals + 1));
  if (change.text.empty()) {
    problems.add(change.place, fmt::format("a value is due after '{}='", change.path));
    return std::nullopt;
  }
  const std::size_t before = problems.count();
  change.value = read_yaml_text(change.text, file, problems);
  if (problems.count() != before) return std::nullopt;
  return change;
}

void apply_override(Node& root, const std::string& path, const Node& value, Place place, Problems& problems) {
  const std::vector<std::string> keys = split(path);
  std::string wrong = why_not_a_path(keys);
  Node* at = wrong.empty() ? &root : nullptr;
  if (at) open_single_section(root, keys, place);
  for (std::size_t i = 0; at && i + 1 < keys.size(); ++i) at = step(*at, keys, i, wrong);
  if (at) {
    const std::size_t last = keys.size() - 1;
    if (at->kind == Node::Kind::null) at->kind = Node::Kind::map;  // a section written empty
    const bool may_be_new = at->is_map() && !at->find(keys[last]);
    if (may_be_new) {
      at->entries.push_back({keys[last], place, value});
      return;
    }
    at = step(*at, keys, last, wrong);
  }
  if (at)
    *at = value;
  else
    problems.add(std::move(place), fmt::format("cannot set '{}': {}", path, wrong));
}

std::string flow_text(const Node& node) {
  std::vector<std::string> parts;
  switch (node.kind) {
    case Node::Kind::missing:
    case Node::Kind::null:
      return "~";
    case Node::Kind::scalar:
      return needs_quotes(node) ? quoted(node.text) : node.text;
    case Node::Kind::list:
      for (const Node& item : node.items) parts.push_back(flow_text(item));
      return fmt::format("[{}]", fmt::join(parts, ", "));
    case Node::Kind::map:
      for (const Node::Entry& e : node.entries)
        parts.push_back(fmt::format("{}: {}", key_text(e.key), flow_text(e.value)));
      return fmt::format("{{{}}}", fmt::join(parts, ", "));
  }
  return {};
}

}  // namespace gaskettle

#include "input/yaml_builder.h"

#include <fmt/format.h>

#include <algorithm>

#include "input/yaml_reader.h"

namespace gaskettle {
namespace {

// The library reports an empty value where the next token stands; only a written one stands there itself.
bool null_is_written(std::string_view text) {
  if (text.starts_with('~')) return true;
  const std::string_view word = text.substr(0, 4);
  if (word != "null" && word != "Null" && word != "NULL") return false;
  return text.size() == 4 || std::string_view(" \t\n,]}#").find(text[4]) != std::string_view::npos;
}

// Past an anchor, to the value itself.
std::string_view skip_anchor(std::string_view text) {
  if (!text.starts_with('&')) return text;
  text.remove_prefix(std::min(text.find_first_of(" \t\n"), text.size()));
  text.remove_prefix(std::min(text.find_first_not_of(" \t\n"), text.size()));
  return text;
}

bool quote_is_closed(std::string_view text) {
  const char quote = text.front();
  for (std::size_t i = 1; i < text.size(); ++i) {
    if (quote == '"' && text[i] == '\\')
      ++i;
    else if (quote == '\'' && text.substr(i, 2) == "''")
      ++i;
    else if (text[i] == quote)
      return true;
  }
  return false;
}

}  // namespace

void TreeBuilder::OnDocumentStart(const YAML::Mark& mark) {
  if (started_) {
    // The library takes what it cannot place after a document for the next document.
    const bool marker = text_.from(mark.line, mark.column).starts_with("---");
    throw YamlRefusal{place(mark), marker ? "a second document begins here; a file holds one model"
                                          : "text is left over here; the model has ended before"};
  }
  started_ = true;
}

void TreeBuilder::OnNull(const YAML::Mark& mark, YAML::anchor_t anchor) {
  const std::string_view text = text_.from(mark.line, mark.column);
  const bool written = null_is_written(skip_anchor(text));
  if (text.starts_with('!')) refuse_tag(mark, "!");
  Node node;
  node.kind = Node::Kind::null;
  node.place = place(mark);
  if (!written && !open_.empty()) node.place = open_.back().key ? open_.back().key->place : open_.back().node.place;
  // Text on a line of its own inside a map comes as a key whose value stands at the key itself.
  const Place at = place(mark);
  if (!written && !open_.empty() && open_.back().key && at.line == node.place.line && at.column == node.place.column) {
    colons_missing_.emplace_back(at, fmt::format("a ':' is missing after '{}'", open_.back().key->text));
    open_.back().key->usable = false;  // or its missing value would be reported as well
  }
  charge(1, 0, node.place);
  put(std::move(node), anchor);
}

void TreeBuilder::OnAlias(const YAML::Mark& mark, YAML::anchor_t anchor) {
  const auto found = anchored_.find(anchor);
  if (found == anchored_.end()) throw YamlRefusal{place(mark), "this alias stands inside the very value it repeats"};
  const Size size = measure(found->second);
  if (open_.size() + size.depth > YamlLimits::depth)
    throw YamlRefusal{place(mark), fmt::format("this alias puts maps and lists more than {} deep inside each other",
                                               YamlLimits::depth)};
  charge(size.nodes, size.bytes, place(mark));
  Node copy = found->second;
  // As a key it stands here: there is no other line to point at for a key given twice.
  const bool is_key = !open_.empty() && open_.back().node.is_map() && !open_.back().key;
  if (is_key) copy.place = place(mark);
  put(std::move(copy), YAML::NullAnchor, true);
}

void TreeBuilder::OnScalar(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                           const std::string& value) {
  refuse_tag(mark, tag);
  Node node;
  node.kind = Node::Kind::scalar;
  node.place = place(mark);
  node.quoted = tag == "!";
  if (value.size() > YamlLimits::scalar_bytes)
    throw YamlRefusal{node.place, fmt::format("this text is {} bytes long; at most {} are read", value.size(),
                                              YamlLimits::scalar_bytes)};
  node.text = value;
  charge(1, value.size(), node.place);
  if (node.quoted) check_scalar(node, mark);
  put(std::move(node), anchor);
}

// Only quoted text needs it: escapes make characters that the text as a whole was checked
// not to hold, and the library closes an open quote at the end of the text without a word.
void TreeBuilder::check_scalar(const Node& node, const YAML::Mark& mark) {
  const std::string_view text = skip_anchor(text_.from(mark.line, mark.column));
  if ((text.starts_with('"') || text.starts_with('\'')) && !quote_is_closed(text))
    throw YamlRefusal{node.place, fmt::format("the quote {} that opens here is never closed", text.front())};
  if (const auto bad = find_bad_character(node.text)) problems_.add(node.place, "this text holds a " + bad->what);
}

void TreeBuilder::OnSequenceStart(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                                  YAML::EmitterStyle::value) {
  open(Node::Kind::list, mark, tag, anchor);
}

void TreeBuilder::OnMapStart(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                             YAML::EmitterStyle::value) {
  open(Node::Kind::map, mark, tag, anchor);
}

void TreeBuilder::open(Node::Kind kind, const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor) {
  refuse_tag(mark, tag);
  if (open_.size() >= YamlLimits::depth)
    throw YamlRefusal{place(mark),
                      fmt::format("maps and lists stand more than {} deep inside each other", YamlLimits::depth)};
  charge(1, 0, place(mark));
  Frame frame;
  frame.node.kind = kind;
  frame.node.place = place(mark);
  frame.anchor = anchor;
  open_.push_back(std::move(frame));
}

void TreeBuilder::close() {
  Node node = std::move(open_.back().node);
  const YAML::anchor_t anchor = open_.back().anchor;
  open_.pop_back();
  put(std::move(node), anchor);
}

// A finished node goes where it belongs: the root, a list, or a map as key or value in turn.
void TreeBuilder::put(Node node, YAML::anchor_t anchor, bool shared) {
  if (anchor != YAML::NullAnchor) {
    const Size size = measure(node);
    charge(size.nodes, size.bytes, node.place);  // the copy kept for aliases
    anchored_[anchor] = node;
  }
  if (open_.empty()) {
    root_ = std::move(node);
    return;
  }
  Frame& parent = open_.back();
  if (parent.node.is_list()) {
    parent.node.items.push_back(std::move(node));
  } else if (!parent.key) {
    put_key(node, shared);
  } else {
    if (parent.key->usable)
      parent.node.entries.push_back({std::move(parent.key->text), std::move(parent.key->place), std::move(node)});
    parent.key.reset();
  }
}

void TreeBuilder::put_key(const Node& node, bool shared) {
  Frame& map = open_.back();
  Key key{node.text, node.place};
  if (node.kind == Node::Kind::null) {
    problems_.add(node.place, "a key is missing here, or is the word null; a key is a name");
    key.usable = false;
  } else if (!node.is_scalar()) {
    problems_.add(node.place, "a map or list stands here as a key; a key is a name");
    key.usable = false;
  } else if (node.text == "<<" && !node.quoted && !shared) {
    problems_.add(node.place, "the merge key '<<' is not supported; write the keys out");
    key.usable = false;
  } else {
    const auto [first, is_new] = map.seen.emplace(node.text, node.place);
    if (!is_new)
      problems_.add(node.place,
                    fmt::format("the key '{}' stands here a second time; the first is in line {}, column {}", node.text,
                                first->second.line, first->second.column));
    key.usable = is_new;
  }
  map.key = std::move(key);
}

// A plain scalar, map or list comes with "?", a quoted scalar with "!"; so does a written '!' alone.
void TreeBuilder::refuse_tag(const YAML::Mark& mark, const std::string& tag) {
  const bool written = text_.from(mark.line, mark.column).starts_with('!');
  if ((tag.empty() || tag == "?" || tag == "!") && !written) return;
  problems_.add(place(mark), "a YAML tag (!...) is not supported; write the value without it");
}

void TreeBuilder::charge(std::size_t nodes, std::size_t bytes, const Place& where) {
  nodes_ += nodes;
  bytes_ += bytes;
  if (nodes_ > YamlLimits::nodes)
    throw YamlRefusal{where, fmt::format("more than {} values, each alias counted as what it repeats; put long tables "
                                         "into a CSV file",
                                         YamlLimits::nodes)};
  if (bytes_ > YamlLimits::expanded_bytes)
    throw YamlRefusal{where, fmt::format("more than {} bytes of values, each alias counted as what it repeats",
                                         YamlLimits::expanded_bytes)};
}

TreeBuilder::Size TreeBuilder::measure(const Node& node) {
  Size total{1, node.text.size(), 0};
  const auto add = [&total](const Size& part) {
    total.nodes += part.nodes;
    total.bytes += part.bytes;
    total.depth = std::max(total.depth, part.depth);
  };
  for (const Node& item : node.items) add(measure(item));
  for (const Node::Entry& entry : node.entries) {
    add(measure(entry.value));
    total.nodes += 1;
    total.bytes += entry.key.size();
  }
  if (node.is_list() || node.is_map()) total.depth += 1;
  return total;
}

}  // namespace gaskettle

/// A model file as plain data: what was written, and where.
///
/// The reader of a file format makes this tree; everything above reads models
/// only through it and never sees the file format's library.
#pragma once
#include <string>
#include <utility>
#include <vector>

#include "base/place.h"

namespace gaskettle {

/// One value of the file. Scalars keep the text as written: what it means is
/// decided by the key that reads it.
struct Node {
  enum class Kind { missing, null, scalar, list, map };
  struct Entry;

  Kind kind = Kind::missing;
  Place place;
  std::string text;            ///< of a scalar
  bool quoted = false;         ///< the scalar stood in quotes
  std::vector<Node> items;     ///< of a list
  std::vector<Entry> entries;  ///< of a map, in the order of the file; keys are unique

  bool is_map() const { return kind == Kind::map; }
  bool is_list() const { return kind == Kind::list; }
  bool is_scalar() const { return kind == Kind::scalar; }
  /// The value of a key of this map, or nullptr.
  const Node* find(const std::string& key) const;
  Node* find(const std::string& key);
  std::vector<std::string> keys() const;
};

struct Node::Entry {
  std::string key;
  Place key_place;
  Node value;
};

inline const Node* Node::find(const std::string& key) const {
  for (const Entry& e : entries)
    if (e.key == key) return &e.value;
  return nullptr;
}
inline Node* Node::find(const std::string& key) { return const_cast<Node*>(std::as_const(*this).find(key)); }
inline std::vector<std::string> Node::keys() const {
  std::vector<std::string> names;
  for (const Entry& e : entries) names.push_back(e.key);
  return names;
}

}  // namespace gaskettle

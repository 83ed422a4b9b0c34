/// Turns the YAML library's events into a Node tree. Events come without recursion of
/// ours, so that depth and size can be refused before they cost anything.
#pragma once
#include <yaml-cpp/eventhandler.h>
#include <yaml-cpp/mark.h>

#include <optional>
#include <string>
#include <unordered_map>
#include <utility>
#include <vector>

#include "base/problems.h"
#include "input/yaml_text.h"
#include "model/document.h"

namespace gaskettle {

/// Thrown through the library's parser where reading on makes no sense.
struct YamlRefusal {
  Place place;
  std::string message;
};

class TreeBuilder : public YAML::EventHandler {
public:
  TreeBuilder(const YamlText& text, Problems& problems) : text_(text), problems_(problems) {}

  /// The tree; Kind::missing where the text held no document.
  Node take_root() { return std::move(root_); }
  /// Passes on the keys without ':' met so far; not called where a bracket is not closed and anything passes for one.
  void report_missing_colons() {
    for (auto& [where, message] : colons_missing_) problems_.add(where, message);
    colons_missing_.clear();
  }
  /// The innermost map or list not closed yet, or nullptr.
  const Node* open_node() const { return open_.empty() ? nullptr : &open_.back().node; }

  void OnDocumentStart(const YAML::Mark& mark) override;
  void OnDocumentEnd() override {}
  void OnNull(const YAML::Mark& mark, YAML::anchor_t anchor) override;
  void OnAlias(const YAML::Mark& mark, YAML::anchor_t anchor) override;
  void OnScalar(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                const std::string& value) override;
  void OnSequenceStart(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                       YAML::EmitterStyle::value style) override;
  void OnSequenceEnd() override { close(); }
  void OnMapStart(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                  YAML::EmitterStyle::value style) override;
  void OnMapEnd() override { close(); }

private:
  struct Key {
    std::string text;
    Place place;
    bool usable = true;  ///< else the value that follows is dropped
  };
  struct Frame {
    Node node;
    YAML::anchor_t anchor;
    std::optional<Key> key;  ///< the one whose value comes next
    std::unordered_map<std::string, Place> seen;
  };
  struct Size {
    std::size_t nodes = 0, bytes = 0, depth = 0;
  };
  static Size measure(const Node& node);

  Place place(const YAML::Mark& mark) const { return text_.place(mark.line, mark.column); }
  void open(Node::Kind kind, const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor);
  void close();
  void put(Node node, YAML::anchor_t anchor, bool shared = false);
  void put_key(const Node& node, bool shared);
  void refuse_tag(const YAML::Mark& mark, const std::string& tag);
  void charge(std::size_t nodes, std::size_t bytes, const Place& where);
  void check_scalar(const Node& node, const YAML::Mark& mark);

  const YamlText& text_;
  Problems& problems_;
  Node root_;
  bool started_ = false;
  std::vector<Frame> open_;
  std::vector<std::pair<Place, std::string>> colons_missing_;
  std::unordered_map<YAML::anchor_t, Node> anchored_;
  std::size_t nodes_ = 0, bytes_ = 0;
};

}  // namespace gaskettle

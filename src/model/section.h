/// Reading one map of a model file, key by key, with its documentation.
///
/// A part states each key once, where it reads it. Run on a model, that statement
/// reads and checks the value; run without one ("describing"), it collects the
/// reference that `explain` prints. Nothing is documented anywhere else.
#pragma once
#include <functional>
#include <initializer_list>
#include <optional>
#include <set>
#include <string>
#include <vector>

#include "base/problems.h"
#include "base/units.h"
#include "model/document.h"
#include "model/signal.h"

namespace gaskettle {

/// What a value must satisfy beside having the right unit.
enum class Range { any, positive, not_negative, fraction /* 0 to 1 */ };

/// A number in SI with how it was written.
struct Value {
  double si = 0.0;
  std::string unit;  ///< as the user wrote it, for printing back
  Place place;
  bool given = false;  ///< false: a default
  bool gauge = false;  ///< was written as gauge; `si` is absolute
  operator double() const { return si; }
};

/// A name that stands for a part or channel defined elsewhere.
struct Reference {
  std::string name;
  Place place;
  bool given() const { return !name.empty(); }
};

/// One line of the reference.
struct KeyDoc {
  std::string section;   ///< "pistons.NAME.friction"
  std::string key;       ///< "kinetic"
  std::string type;      ///< "length", "name of a gas space", "one of flat, ..."
  std::string units;     ///< example spellings
  std::string fallback;  ///< default as text; empty where there is none
  std::string meaning;
  bool required = false;
  bool varies = false;
};

struct Material;

/// What reading needs and collects.
struct ReadContext {
  explicit ReadContext(Problems& p);
  ReadContext(const ReadContext&) = delete;
  ~ReadContext();

  Problems& problems;
  double atmosphere = 101325.0;            ///< Pa; gauge pressures stand above it
  std::vector<std::string> own_gases;      ///< names from the `gases` section
  std::vector<Material> own_materials;     ///< from the `materials` section
  std::vector<KeyDoc>* docs = nullptr;     ///< where describing collects
  std::vector<std::string> defaults_used;  ///< "walls.shell.outside.emissivity = 0.9"
  std::set<std::string> unsound;           ///< parts with a mistake; who refers to them is not to blame
};

class Section {
public:
  /// Reads the map `node`; a node of another kind is reported.
  Section(ReadContext& context, const Node* node, std::string path);
  /// Describes: every key is visited, nothing is read.
  Section(ReadContext& context, std::string path);
  Section(Section&& other) noexcept;
  Section& operator=(Section&&) = delete;
  Section(const Section&) = delete;
  /// Reports the keys that nobody asked for.
  ~Section();

  /// Leaves the check for unknown keys to a later reader of the same node.
  void leave() { owner_ = false; }
  bool describing() const { return node_ == nullptr && context_->docs != nullptr; }
  bool has(const std::string& key) const { return describing() || (node_ != nullptr && node_->find(key) != nullptr); }
  const Place& place() const { return place_; }
  Place place_of(const std::string& key) const;
  const std::string& path() const { return path_; }
  const Node* node() const { return node_; }
  ReadContext& context() { return *context_; }

  Value quantity(const std::string& key, const UnitKind& kind, const std::string& meaning, Range range);
  Value quantity(const std::string& key, const UnitKind& kind, const std::string& meaning, Range range,
                 const std::string& fallback);
  std::optional<Value> optional_quantity(const std::string& key, const UnitKind& kind, const std::string& meaning,
                                         Range range);
  /// A value that may vary in time. `fallback` empty: left out means not given.
  SignalSpec signal(const std::string& key, const UnitKind& kind, const std::string& meaning, Range range,
                    const std::string& fallback = "");
  SignalSpec required_signal(const std::string& key, const UnitKind& kind, const std::string& meaning, Range range);
  /// As `signal`, for gas flows: all points must have one basis, which is returned.
  SignalSpec flow_signal(const std::string& key, const std::string& meaning, FlowBasis& basis);

  std::string text(const std::string& key, const std::string& meaning, const std::string& fallback);
  std::string choice(const std::string& key, const std::vector<std::string>& options, const std::string& meaning,
                     const std::string& fallback);
  std::string required_choice(const std::string& key, const std::vector<std::string>& options,
                              const std::string& meaning);
  bool flag(const std::string& key, const std::string& meaning, bool fallback);
  long integer(const std::string& key, const std::string& meaning, long least, long fallback);
  Reference reference(const std::string& key, const std::string& what, const std::string& meaning, bool required);

  /// A map inside this one; absent gives nullopt (when describing: always present).
  std::optional<Section> child(const std::string& key, const std::string& meaning, bool required = false);
  /// The raw node of a key that the caller reads in its own way.
  const Node* raw(const std::string& key, const std::string& type, const std::string& meaning, bool required,
                  const std::string& fallback = "");
  /// Items of a list; each is given as a Section to `read`.
  void list(const std::string& key, const std::string& meaning, bool required,
            const std::function<void(Section&, int)>& read);
  /// A key of the published format that this version does not have yet: refused by name.
  void not_built_yet(const std::string& key, const std::string& meaning);

  /// Exactly one of the keys must be there; the others are an error. True where it is so.
  bool exactly_one_of(std::initializer_list<const char*> keys);
  bool at_most_one_of(std::initializer_list<const char*> keys);

  void error(const std::string& key, const std::string& message);
  void error_here(const std::string& message);

private:
  const Node* take(const std::string& key);
  void document(const std::string& key, const std::string& type, const UnitKind* kind, const std::string& fallback,
                const std::string& meaning, bool required, bool varies = false);
  void missing(const std::string& key, const std::string& example);

  ReadContext* context_;
  const Node* node_ = nullptr;
  Place place_;
  std::string path_;
  std::set<std::string> known_;
  bool owner_ = true;
};

/// Reads a scalar node as a quantity; reports and returns nullopt where it is not one.
std::optional<Value> read_value(ReadContext& context, const Node& node, const std::string& path, const UnitKind& kind,
                                Range range, FlowBasis* basis = nullptr);
/// Reads a value that may vary in time.
SignalSpec read_signal(ReadContext& context, const Node& node, const std::string& path, const UnitKind& kind,
                       Range range = Range::any);
/// The kind of a difference of two values of a kind.
const UnitKind& difference_kind(const UnitKind& kind);
/// Reads a pure number; reports and returns nullopt where it is not one.
std::optional<double> read_number(ReadContext& context, const Node& node, const std::string& path);

}  // namespace gaskettle

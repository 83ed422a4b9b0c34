#include "plant/model.h"

#include <fmt/format.h>

#include <algorithm>
#include <cctype>

#include "gas/catalogue.h"
#include "model/materials.h"
#include "plant/watch.h"

namespace gaskettle {

namespace {
const std::vector<std::string> reserved_names = {"surroundings", "atmosphere", "energy", "entropy", "mass",
                                                 "time",         "event",      "target", "limit",   "case"};

/// Whether a part may bear this name; says why not.
bool good_name(ReadContext& context, const std::string& name, const Place& place) {
  const auto letter = [](char c) { return std::isalnum(static_cast<unsigned char>(c)) != 0 || c == '_' || c == '-'; };
  const bool shaped = !name.empty() && name.size() <= 64 && std::isalpha(static_cast<unsigned char>(name[0])) != 0 &&
                      std::all_of(name.begin(), name.end(), letter);
  if (!shaped) {
    context.problems.add(
        place,
        fmt::format("'{}' cannot be a name: use letters, digits, '_' and '-', beginning with a letter, 64 at most",
                    name.substr(0, 70)));
    return false;
  }
  if (std::find(reserved_names.begin(), reserved_names.end(), name) == reserved_names.end()) return true;
  context.problems.add(place, fmt::format("the name '{}' is reserved; choose another", name));
  return false;
}

/// Calls read(name, place, section) for each entry of a map of named things.
template <class F>
void for_each_named(ReadContext& context, const Node* map, const std::string& section, F&& read) {
  if (map == nullptr || map->kind == Node::Kind::null) return;
  if (!map->is_map()) {
    context.problems.add(map->place, fmt::format("'{}' should be a map of names, not {}", section,
                                                 map->is_list() ? "a list" : "'" + map->text + "'"));
    return;
  }
  for (const Node::Entry& e : map->entries) {
    const std::size_t before = context.problems.count();
    good_name(context, e.key, e.key_place);
    Section s(context, &e.value, section + "." + e.key);
    if (e.value.is_map()) read(e.key, e.key_place, s);
    if (context.problems.count() > before) context.unsound.insert(e.key);
  }
}

Species read_own_gas(Section& s, const std::string& name) {
  const Value molar_mass = s.quantity("molar_mass", unit_kinds::molar_mass, "of the gas", Range::positive);
  double cp = 1000.0;
  bool readable = molar_mass.given && s.has("cp");
  const Node* node =
      s.raw("cp", "specific heat (J/kg/K) or molar specific heat (J/mol/K)", "at constant pressure, constant", true);
  if (node != nullptr && node->is_scalar()) {
    try {
      cp = parse_quantity(node->text, unit_kinds::molar_specific_heat).value / molar_mass.si;
      readable = molar_mass.given;
    } catch (const UnitError&) {
      // Not by mole: then by mass, as most write it and as the message says.
      if (const auto by_mass =
              read_value(s.context(), *node, s.path() + ".cp", unit_kinds::specific_heat, Range::positive))
        cp = by_mass->si;
      else
        readable = false;
    }
  } else if (node != nullptr) {
    s.error("cp", fmt::format("'{}.cp' should be a specific heat such as 1000 J/kg/K", s.path()));
  }
  const auto viscosity =
      s.optional_quantity("viscosity", unit_kinds::viscosity, "for films by correlation", Range::positive);
  const auto conductivity =
      s.optional_quantity("conductivity", unit_kinds::conductivity, "for films by correlation", Range::positive);
  const auto plain = [](const std::optional<Value>& v) { return v ? std::optional<double>(v->si) : std::nullopt; };
  try {
    return constant_cp_gas(name, molar_mass, cp, plain(viscosity), plain(conductivity));
  } catch (const std::invalid_argument& e) {
    if (!s.describing() && readable) s.error("cp", fmt::format("'{}': {}", s.path(), e.what()));
    return constant_cp_gas(name, 0.028, 1040.0);
  }
}

RunSettings read_run(Section& s) {
  RunSettings r;
  const Value until = s.quantity("until", unit_kinds::time, "length of the run", Range::positive);
  r.until = until;
  r.time_unit = until.unit;
  const auto every = s.optional_quantity("record_every", unit_kinds::time, "between rows of the record (until / 1000)",
                                         Range::positive);
  r.record_every = every ? every->si : r.until / 1000.0;
  if (every && until.given && r.until / r.record_every > 2e7)
    s.error("record_every",
            fmt::format("'run.record_every' would make {:.3g} rows; 20 million is the most", r.until / r.record_every));
  r.rtol = s.quantity("rtol", unit_kinds::number, "relative accuracy of a step", Range::positive, "1e-8");
  if (!s.describing() && (r.rtol < 1e-13 || r.rtol > 1e-2)) {
    s.error("rtol", "'run.rtol' must lie between 1e-13 and 1e-2");
    r.rtol = 1e-8;
  }
  const std::string method = s.choice("method", {"auto", "stiff", "explicit"}, "of integration", "auto");
  r.method = method == "stiff" ? Method::stiff : (method == "explicit" ? Method::explicit_ : Method::automatic);
  r.stop_when = s.reference("stop_when", "target", "end the run when this target is reached", false);
  return r;
}

template <class Part>
void read_kind(Model& model, ReadContext& context, const Node* node) {
  auto& list = std::get<std::vector<Part>>(model.parts);
  for_each_named(context, node, Part::section, [&](const std::string& name, const Place& place, Section& s) {
    Part part;
    part.name = name;
    part.place = place;
    part.read(s);
    list.push_back(std::move(part));
  });
}

template <class... Part>
void read_kinds(Model& model, ReadContext& context, Section& top, const Node& root, PartKinds<Part...>) {
  (top.raw(Part::section, std::string("map of NAME: ") + Part::kind, Part::meaning, false), ...);
  (read_kind<Part>(model, context, root.find(Part::section)), ...);
}

template <class... Part>
void describe_kinds(ReadContext& context, PartKinds<Part...>) {
  Section top(context, "");
  const auto describe = [&]<class P>(P part) {
    top.raw(P::section, std::string("map of NAME: ") + P::kind, P::meaning, false);
    Section s(context, std::string(P::section) + ".NAME");
    part.read(s);
  };
  (describe(Part{}), ...);
}

void read_watches(Model& model, ReadContext& context, const Node& root) {
  for_each_named(context, root.find("targets"), "targets",
                 [&](const std::string& name, const Place& place, Section& s) {
                   model.targets.push_back({name, place, s.node()});
                   s.leave();
                 });
  for_each_named(context, root.find("limits"), "limits", [&](const std::string& name, const Place& place, Section& s) {
    model.limits.push_back({name, place, s.node()});
    s.leave();
  });
}

void read_top(Section& top) {
  top.raw("gaskettle", "1", "version of the model format", top.describing());  // asked for where the file is opened
  top.raw("gases", "map of NAME: gas", "gases of one's own", false);
  top.raw("materials", "map of NAME: material", "materials of one's own", false);
  top.raw("surroundings", "map", "what the vessel stands in", false);
  top.raw("targets", "map of NAME: target", "what is to be reached, and when it is", false);
  top.raw("limits", "map of NAME: limit", "what is not to be exceeded", false);
}

template <class... Part>
void check_names(const Model& model, const Node& root, ReadContext& context, PartKinds<Part...>) {
  std::map<std::string, std::string> taken;
  const auto check = [&]<class P>(const std::vector<P>& list) {
    for (const P& p : list) {
      const auto [where, fresh] = taken.emplace(p.name, P::kind);
      if (!fresh)
        context.problems.add(
            p.place,
            fmt::format("the name '{}' is already that of a {}; names must differ, since channels are named by them",
                        p.name, where->second));
    }
  };
  (check(std::get<std::vector<Part>>(model.parts)), ...);
  const Node* spaces = root.find("gas_spaces");
  const bool none = spaces == nullptr || (spaces->is_map() && spaces->entries.empty());
  if (none)
    context.problems.add(spaces != nullptr ? spaces->place : root.place,
                         "the model has no gas space; it needs at least one under 'gas_spaces'");
}
}  // namespace

Model read_model(const Node& root, ReadContext& context) {
  Model model;
  Section top(context, &root, "");
  if (!root.is_map()) return model;
  read_top(top);
  model.title = top.text("title", "of the model", "");
  model.notes = top.text("notes", "for the reader", "");
  model.gas_model =
      top.choice("gas_model", {"auto", "ideal", "cubic", "reference"}, "how gas properties are found", "auto");
  if (model.gas_model == "cubic" || model.gas_model == "reference")
    top.error("gas_model", fmt::format("'gas_model: {}' is not built yet; use auto or ideal", model.gas_model));
  for_each_named(context, root.find("gases"), "gases", [&](const std::string& name, const Place& place, Section& s) {
    if (find_gas(name))
      context.problems.add(place, fmt::format("'{}' is a built-in gas; give your own another name", name));
    model.own_gases.emplace(name, read_own_gas(s, name));
    context.own_gases.push_back(name);
  });
  // After the gases: one of them may be what the surroundings are made of.
  model.surroundings = read_surroundings(context, root.find("surroundings"));
  for_each_named(context, root.find("materials"), "materials", [&](const std::string& name, const Place&, Section& s) {
    context.own_materials.push_back(read_material_map(s, name));
  });
  if (auto run = top.child("run", "how long, how finely, how accurately", true)) model.run = read_run(*run);
  read_kinds(model, context, top, root, Catalogue{});
  read_watches(model, context, root);
  check_names(model, root, context, Catalogue{});
  model.defaults_used = context.defaults_used;
  return model;
}

std::vector<KeyDoc> describe_model() {
  Problems none;
  std::vector<KeyDoc> docs;
  ReadContext context(none);
  context.docs = &docs;
  {
    Section top(context, "");
    read_top(top);
    top.text("title", "of the model", "");
    top.text("notes", "for the reader", "");
    top.choice("gas_model", {"auto", "ideal", "cubic", "reference"},
               "how gas properties are found (cubic, reference: not built yet)", "auto");
  }
  describe_surroundings(context);
  {
    Section s(context, "gases.NAME");
    read_own_gas(s, "NAME");
  }
  {
    Section s(context, "materials.NAME");
    read_material_map(s, "NAME");
  }
  describe_kinds(context, Catalogue{});
  describe_watches(context);
  Section(context, "").raw("run", "map", "how long, how finely, how accurately", true);
  Section run(context, "run");
  read_run(run);
  return docs;
}

}  // namespace gaskettle

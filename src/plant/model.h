/// A model as read: every part with its parameters, before it is laid out.
#pragma once
#include <string>
#include <vector>

#include "model/document.h"
#include "model/section.h"
#include "model/surroundings.h"
#include "parts/catalogue.h"
#include "solve/settings.h"

namespace gaskettle {

/// The `run` section.
struct RunSettings {
  double until = 0.0;         ///< s
  double record_every = 0.0;  ///< s
  double rtol = 1e-8;
  Method method = Method::automatic;
  Reference stop_when;    ///< a target
  std::string time_unit;  ///< how `until` was written
};

/// What a target or limit says, before channels are known.
struct WatchSpec {
  std::string name;
  Place place;
  const Node* node = nullptr;
};

struct Model {
  std::string title, notes, gas_model = "auto";
  Surroundings surroundings;
  std::map<std::string, Species> own_gases;
  Catalogue::Lists parts;
  std::vector<WatchSpec> targets, limits;
  RunSettings run;
  std::vector<std::string> defaults_used;
};

/// Reads a whole model; problems are collected in the context, and what could be read is returned.
Model read_model(const Node& root, ReadContext& context);

/// The reference of every key, from the same code that reads them.
std::vector<KeyDoc> describe_model();

}  // namespace gaskettle

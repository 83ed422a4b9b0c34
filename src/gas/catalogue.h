/// The gases that a model can name without further ado.
#pragma once
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "gas/species.h"

namespace gaskettle {

struct GasEntry {
  Species species;
  std::vector<std::string> aliases;  ///< the formula, and other names: N2; steam
};

/// All gases with published data, in the order of the documentation.
const std::vector<GasEntry>& gas_catalogue();

/// The gas of this name or alias (exact spelling), if there is one.
std::optional<Species> find_gas(std::string_view name_or_alias);

/// Names, then aliases: what a misspelt name is compared with.
std::vector<std::string> gas_names();

/// Version of the data, to be kept in every record: changes with any figure.
std::string gas_data_version();

}  // namespace gaskettle

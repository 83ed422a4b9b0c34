/// Names of units that people write and UDUNITS-2 does not know or reads as
/// something else.
#pragma once
#include <string_view>

namespace gaskettle::unit_reading {

struct UnitAlias {
  std::string_view name;
  double factor;
  std::string_view meaning;  ///< for UDUNITS: one `name` is `factor` of these
};

/// The alias of that name, or nullptr.
const UnitAlias* find_unit_alias(std::string_view name);

/// Words with a meaning of their own to UDUNITS (dates, offsets, logarithms),
/// never units here.
bool is_reserved_unit_word(std::string_view word);

}  // namespace gaskettle::unit_reading

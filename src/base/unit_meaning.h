/// What a written unit means for a kind of quantity, and the messages about it.
#pragma once
#include <string>

#include "base/unit_expression.h"
#include "base/units.h"

namespace gaskettle::unit_reading {

/// What a written unit means for a kind.
struct UnitMeaning {
  UnitScale scale;
  bool gauge = false;
  FlowBasis basis = FlowBasis::mass;
};

/// A unit on its way to its meaning, with what messages about it need.
struct UnitRequest {
  std::string written;  ///< number and unit, for messages: "12 furlong"
  std::string number;   ///< "12"
  std::string unit;     ///< in ASCII: "furlong"
  const UnitKind& kind;
};

/// "an area", "a length".
std::string with_article(const std::string& noun);

/// "write for example 250 mm or 1.8 m".
std::string advice(const UnitKind& kind);

/// Throws a UnitError: what was written, why it is refused, and advice.
[[noreturn]] void refuse(const UnitRequest& r, const std::string& why);

/// Reads the unit by the rules of the kind's flavour. Errors: UnitError.
UnitMeaning meaning_of(const UnitRequest& r);

}  // namespace gaskettle::unit_reading

/// All that is wrong with an input, collected in one pass.
#pragma once
#include <string>
#include <vector>

#include "base/place.h"

namespace gaskettle {

/// One thing that is wrong: where, what, and what would be right.
struct Problem {
  Place place;
  std::string message;
};

/// Collects problems; readers go on after reporting one, so that the user sees
/// all of them at once.
class Problems {
public:
  void add(Place place, std::string message);
  bool empty() const { return list_.empty(); }
  std::size_t count() const { return list_.size(); }
  /// In the order of the files' lines; duplicates removed.
  std::vector<Problem> sorted() const;
  /// One line a problem, `file:line:column: error: message`; after `most` the rest are counted.
  std::string text(std::size_t most = 100) const;

private:
  std::vector<Problem> list_;
};

/// The name out of `known` that is nearest to `wrong` by edit distance, or empty
/// where none is near enough to be worth suggesting.
std::string nearest_name(const std::string& wrong, const std::vector<std::string>& known);

}  // namespace gaskettle

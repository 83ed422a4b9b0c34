/// Where in which file something stands, so that a message can point at it.
#pragma once
#include <memory>
#include <string>

namespace gaskettle {

/// line and column count from 1; 0 means "no place" (a value set by the program).
struct Place {
  std::shared_ptr<const std::string> file;
  int line = 0;
  int column = 0;
  /// "file:line:column", or the file alone where the line is not known.
  std::string text() const;
};

}  // namespace gaskettle

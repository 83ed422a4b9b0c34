// Calls one thing of each floor that brings a library along, so that linking fails if the package forgot it.
#include <cstdio>

#include "base/problems.h"
#include "base/units.h"
#include "base/version.h"
#include "gas/catalogue.h"
#include "input/study_file.h"
#include "record/record_reader.h"

int main() {
  const auto nitrogen = gaskettle::find_gas("N2");
  gaskettle::Problems problems;
  gaskettle::load_model("no such model.yaml", {}, problems);  // yaml-cpp
  bool refused = false;
  try {
    gaskettle::RecordReader record("no such record.h5");  // HDF5
  } catch (const gaskettle::RecordError&) {
    refused = true;
  }
  const double length = gaskettle::parse_quantity("2 km", gaskettle::unit_kinds::length).value;  // UDUNITS-2
  std::printf("gaskettle %s\n", gaskettle::program_version);
  return nitrogen && !problems.empty() && refused && length > 1999.0 && length < 2001.0 ? 0 : 1;
}

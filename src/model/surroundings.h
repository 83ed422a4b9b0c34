/// The surroundings: what the plant stands in and loses heat to.
#pragma once
#include "model/composition.h"

namespace gaskettle {

struct Surroundings {
  SignalSpec temperature, wind;
  Value pressure, gravity;
  Composition gas;
};

/// Reads the `surroundings` section; sets the atmosphere that gauge pressures stand above.
Surroundings read_surroundings(ReadContext& context, const Node* node);
void describe_surroundings(ReadContext& context);
/// Claims the inputs of the surroundings and the gas for outside films.
void connect_surroundings(const Surroundings& surroundings, Layout& layout);

}  // namespace gaskettle

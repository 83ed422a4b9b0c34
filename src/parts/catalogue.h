/// Every kind of part there is. To add one, write its file and its test and add it here.
///
/// The order is the order of evaluation within each phase of the rates, of simultaneous
/// events, and of the sections in the reference.
#pragma once
#include <tuple>
#include <vector>

#include "parts/body.h"
#include "parts/controller.h"
#include "parts/gas_space.h"
#include "parts/heater.h"
#include "parts/piston.h"
#include "parts/port.h"
#include "parts/relief_device.h"
#include "parts/sensor.h"
#include "parts/stirrer.h"
#include "parts/wall.h"

namespace gaskettle {

template <class... Part>
struct PartKinds {
  using Lists = std::tuple<std::vector<Part>...>;
};

using Catalogue = PartKinds<GasSpace, Stirrer, Wall, Body, Heater, Port, ReliefDevice, Piston, Sensor, Controller>;

}  // namespace gaskettle

/// Grey-body exchange of something inside a space with the walls around it.
#pragma once
#include "model/layout.h"

namespace gaskettle {

/// Exchange areas (m2) of a grey surface with each radiating wall around a space: the
/// two-surface formula (Incropera et al., 6th ed., eq. 13.23, F12 = 1), with the walls
/// sharing the surface in proportion to their area. Returns (store of the wall's inner
/// face, exchange area). Empty where no wall radiates.
std::vector<std::pair<int, double>> share_radiation(const Layout& layout, int space, double area, double emissivity);

}  // namespace gaskettle

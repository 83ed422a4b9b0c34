#include "model/enclosure.h"

#include "laws/radiation.h"

namespace gaskettle {

std::vector<std::pair<int, double>> share_radiation(const Layout& layout, int space, double area, double emissivity) {
  double total = 0.0;
  for (const FaceInfo& f : layout.faces)
    if (f.wall && f.space == space) total += f.area;
  std::vector<std::pair<int, double>> shares;
  for (const FaceInfo& f : layout.faces) {
    if (!f.wall || f.space != space || f.emissivity <= 0.0) continue;
    const double exchange = two_surface_exchange_area(area * f.area / total, emissivity, f.area, f.emissivity);
    shares.emplace_back(f.store, exchange);
  }
  return shares;
}

}  // namespace gaskettle

#include "model/network.hpp"

#include <algorithm>

namespace model {

NodeId Network::node_of(NetId net) const {
  const auto at = std::lower_bound(nets.begin(), nets.end(), net,
                                   [](const auto& entry, NetId wanted) { return entry.first < wanted; });
  return at != nets.end() && at->first == net ? at->second : NodeId{};
}

}  // namespace model

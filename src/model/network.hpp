// The network of one input: what is electrically joined to it, cut at the rails, with nodes of its own numbering.
#pragma once

#include <array>
#include <cstdint>
#include <utility>
#include <vector>

#include "base/id.hpp"
#include "model/circuit.hpp"

namespace model {

using NodeId = base::Id<struct NodeTag>;
using BranchId = base::Id<struct BranchTag>;

inline constexpr NodeId ground_node{0};

// What a branch stands for where it is no element of the netlist.
enum class BranchOrigin : std::uint8_t {
  element,           // `element`
  sensor,            // the declared sensor off the board, or the one that replaces an instance
  rail,              // the ideal source of a rail
  rail_resistance,   // between that source and the rail's net
  leakage,           // of the converter input on node nodes[0]
  input_resistance,  // of that input
  stand_in,          // of `element` or of an instance
};

// Parts as in the circuit. Differences: CurrentControlled::through is not used (`through` below is), and every Number
// that the plan does not override is fixed. Behavioural expressions name NetIds: Network::node_of finds their nodes.
struct Branch {
  Part part;
  std::array<NodeId, 5> nodes{};
  std::uint8_t node_count = 0;
  BranchOrigin origin = BranchOrigin::element;
  ElementId element;
  BranchId through;  // CurrentControlled: the voltage source whose current controls it
};

struct Network {
  std::uint32_t node_count = 1;                // ground, node 0, included
  std::vector<std::pair<NetId, NodeId>> nets;  // ordered by net; nets joined by shorts share a node
  std::vector<Branch> branches;
  bool linear = true;  // no Device and no Behavioural among the branches

  // The node of a net, or none where the net is not part of the network.
  [[nodiscard]] NodeId node_of(NetId net) const;
};

// V(Rx) = open_volts + (short_volts - open_volts) * source_ohms / (source_ohms + Rx): the one-port form of a linear
// network with one resistance left free (the bilinear theorem for linear networks).
struct OnePort {
  double open_volts = 0;
  double short_volts = 0;
  double source_ohms = 0;
};

}  // namespace model

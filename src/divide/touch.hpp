// What stands in the way of an audit: parts without a model, and cards that could not be read, on an input's network.
#pragma once

#include <string>
#include <string_view>
#include <unordered_set>
#include <vector>

#include "base/names.hpp"
#include "divide/collect.hpp"
#include "divide/graph.hpp"
#include "model/divider.hpp"
#include "model/netlist.hpp"
#include "source/text.hpp"

namespace divide {

// Whether a part without a model may be taken as open, by its reference designator's class letters (IEEE 315: J and P
// connectors, TP test points, C capacitors, D diodes and clamp arrays). The letter is that of its card: an instance's
// own X stands before the class letters.
[[nodiscard]] bool is_taken_as_open(std::string_view name, char letter);

// Parts without a model that touch a node of the network; declared converters are left out.
[[nodiscard]] std::vector<model::UnmodelledTouch> find_touches(const Graph& graph, const Surroundings& around);

// The words of cards that could not be read, for asking whether one of them is a net of a network.
class BrokenCards {
 public:
  BrokenCards(const model::Netlist& netlist, const source::Sources& sources, const base::NameTable& names);

  // The cards that name a net of the network, in order: the net by its own name, by its name inside its subcircuit, or
  // by the port of an instance that is joined to it. A hundred are enough.
  [[nodiscard]] std::vector<model::CardId> touching(const Graph& graph, const Surroundings& around,
                                                    const model::Netlist& netlist) const;

 private:
  struct Card {
    model::CardId id;
    std::unordered_set<std::string> words;  // folded
  };
  std::vector<Card> cards_;
  const base::NameTable& names_;
};

// Why parts without a model (`touches`) and cards that could not be read keep an input from being audited: a sentence
// for all such parts, and one for each card (or for all that one fault has taken), with its place and reason.
[[nodiscard]] std::vector<std::string> obstacles(const Graph& graph, const Surroundings& around,
                                                 const std::vector<model::UnmodelledTouch>& touches,
                                                 const BrokenCards& broken, const model::Netlist& netlist,
                                                 const source::Sources& sources);

}  // namespace divide

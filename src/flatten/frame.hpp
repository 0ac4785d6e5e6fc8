// One instance while it is expanded (the top level too), and all that one flattening works on.
#pragma once

#include <array>
#include <string>
#include <unordered_map>
#include <utility>
#include <vector>

#include "flatten/flatten.hpp"
#include "flatten/library.hpp"
#include "flatten/problems.hpp"
#include "flatten/wiring.hpp"

namespace flatten {

// A parameter of a frame, worked out when it is first asked for.
struct ParameterState {
  enum class Status : std::uint8_t { fresh, open, done, failed };
  Status status = Status::fresh;
  bool odd = false;   // SPICE would read some literal behind it differently
  bool told = false;  // of a failed one: the user has been told why
  model::Number number;
  std::string failure;  // one sentence, of a failed one; empty where its cause has been told
  source::Span where;   // of the failure
  model::CardId card;
  model::InstanceId instance;
};

inline constexpr std::size_t readings = 3;  // of expression::Literals

// A value that SPICE reads differently, in a model that several elements may use.
struct OddValue {
  source::Span where;
  double builder = 0;
  double spice = 0;
};

// A device model as this frame's elements may use it.
struct UsableModel {
  enum class Why : std::uint8_t { usable, unsupported, failed };
  Why why = Why::unsupported;
  model::DeviceModelId id;
  std::vector<OddValue> odd;
};

struct Frame {
  const Frame* caller = nullptr;  // none at the top level
  model::ScopeId scope{0};
  model::InstanceId instance;
  const model::ElementCard* call = nullptr;  // the X card that makes this instance
  std::string path;                          // before the names of its elements and nets: "X1.X2."
  std::size_t depth = 0;
  std::vector<model::NetId> nets;                            // by node of the subcircuit; the top level has none
  std::vector<std::pair<std::size_t, std::uint32_t>> swept;  // parameter slots that are variables, with their index
  std::size_t first_element = 0;

  mutable std::array<std::vector<ParameterState>, readings> parameters;
  mutable std::unordered_map<const model::ModelCard*, UsableModel> models;
  // Voltage sources by full name, filled when an expression or a controlled source first asks.
  mutable std::unordered_map<base::NameId, model::ElementId> sources;
  mutable bool sources_known = false;
};

// What one flattening reads, and the circuit that it makes.
struct Work {
  Work(model::Netlist& cards, base::NameTable& table, const Options& chosen, const source::Limits& allowed)
      : netlist(cards), names(table), options(chosen), limits(allowed), library(cards), wiring(cards, table, circuit) {}
  Work(const Work&) = delete;
  Work& operator=(const Work&) = delete;

  model::Netlist& netlist;
  base::NameTable& names;
  const Options& options;
  const source::Limits& limits;
  model::Circuit circuit;
  Problems problems;
  Library library;
  Wiring wiring;

  // A name as messages show it.
  [[nodiscard]] std::string shown(base::NameId name) const;

  // The full name of an element or net of an instance.
  base::NameId inner_name(const Frame& frame, base::NameId own) {
    full_.assign(frame.path).append(names.text(own));
    return names.intern(full_);
  }

  // The place of a byte of a card's text.
  [[nodiscard]] source::Span place(model::CardId card, std::uint32_t offset) const {
    return {{netlist.cards[card.index()].source, offset}, 0};
  }
  [[nodiscard]] source::Span place(model::CardId card, const model::Word& word) const {
    return {{netlist.cards[card.index()].source, word.offset},
            static_cast<std::uint32_t>(names.text(word.name).size())};
  }

  // Gives a card its fate; of several instances the worst one counts.
  void settle(model::CardId card, model::CardFate fate);

  // Gives a card the fate error; of several reasons the first stays. `cause` is the card that is at fault, where that
  // is another.
  void blame(model::CardId card, source::Span where, std::string reason, model::CardId cause = {});

  // Says an error of a card and blames it for that.
  void fail(ProblemKind kind, model::CardId card, source::Span where, model::InstanceId instance, std::string message);

 private:
  std::string full_;
};

}  // namespace flatten

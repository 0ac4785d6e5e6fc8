// Parameters: what a name is worth in an instance. A parameter is worked out when first used, so that it may be defined
// after its use; one that needs itself is an error.
#pragma once

#include <optional>
#include <string>
#include <variant>
#include <vector>

#include "expression/evaluate.hpp"
#include "flatten/frame.hpp"
#include "model/value.hpp"

namespace flatten {

// A parameter and the frame that defines it.
struct FoundParameter {
  const Frame* frame = nullptr;  // none: no such parameter
  std::size_t slot = 0;
};

// What a tree of the netlist asks for.
struct Wants {
  std::vector<base::NameId> parameters;
  const model::ExpressionNode* odd = nullptr;  // its first literal that SPICE reads differently
  bool circuit = false;                        // net voltages or currents
};

// What an expression folded to.
struct Folded {
  model::Number number;
  bool odd = false;  // it rests on a literal that SPICE reads differently, in the tree or behind a parameter
};

class Parameters {
 public:
  explicit Parameters(Work& work);

  // A parameter as SPICE finds it: in the frame itself, then in the frame that made the instance, and so on outwards
  // (ngspice 39, measured: an inner subcircuit sees its caller's parameters).
  [[nodiscard]] FoundParameter find(const Frame* frame, base::NameId name) const;

  [[nodiscard]] Wants wants(model::ExpressionId tree) const;

  // Folds an expression of a card in a frame. Nothing where that failed; the user has been told unless `quiet`.
  std::optional<Folded> fold(const Frame& frame, model::ExpressionId tree, model::CardId card,
                             expression::Literals literals, bool quiet = false);

  // The value of the parameter that `name` means in a frame, told in the same way at `where`.
  std::optional<Folded> value(const Frame& frame, base::NameId name, model::CardId card, source::Span where,
                              expression::Literals literals, bool quiet = false);

  // Works out every parameter that a frame defines, so that the user hears of those that fail though nobody uses them.
  void check_all(const Frame& frame);

  // The voltage source that an expression or a controlled source means; none where the frame has none of that name.
  [[nodiscard]] model::ElementId source(const Frame& frame, base::NameId name) const;

 private:
  struct Definition {
    const model::Value* value = nullptr;
    const Frame* frame = nullptr;  // whose parameters its expression sees
    model::CardId card;
    source::Span where;
    base::NameId outer;   // a name that means an outer parameter here: a default may name itself
    bool broken = false;  // its card could not be read
  };
  struct Asked {
    const Frame* frame;
    std::size_t slot;
  };

  [[nodiscard]] Definition definition(const Frame& frame, std::size_t slot) const;
  [[nodiscard]] FoundParameter seen(const Definition& definition, base::NameId name) const;
  [[nodiscard]] base::NameId name_of(const Asked& asked) const;
  [[nodiscard]] std::string unknown(const Frame& frame, base::NameId name) const;
  ParameterState& state(const Asked& asked) const;

  void settle(const FoundParameter& found);
  bool ready(const Asked& asked, std::vector<Asked>& open);
  void fail_cycle(const Asked& again, const std::vector<Asked>& open);
  void work_out(const Asked& asked);
  void work_out_expression(ParameterState& state, const Definition& definition, model::ExpressionId tree);
  void work_out_word(ParameterState& state, const Definition& definition, base::NameId word);
  void fail(ParameterState& state, const Definition& definition, std::string message, source::Span where);

  std::variant<model::Number, std::string> lookup(const Definition& asking, base::NameId name);
  void blame(const Frame& frame, model::CardId card, source::Span where, std::string message);
  expression::Meaning meaning(const Definition& asking);
  void tell(ParameterState& state);

  Work& work_;
  expression::Literals literals_ = expression::Literals::milli;  // the reading in force
  bool quiet_ = false;
  bool odd_ = false;           // some parameter looked up rests on an odd literal
  base::NameId failed_;        // the parameter that was looked up last without success
  model::CardId failed_card_;  // and the card that is at fault
};

}  // namespace flatten

#include "simulate/copy_writer.hpp"

#include "base/overloaded.hpp"
#include "simulate/device_card.hpp"
#include "simulate/numbers.hpp"
#include "simulate/topology.hpp"

namespace simulate {

CopyWriter::CopyWriter(const DeckWriter& plan, Deck& deck)
    : plan_(plan),
      network_(plan.plan_->network),
      text_(deck.request.deck),
      vectors_(deck.request.vectors),
      deck_(deck) {
  leaves_.net_volts = [this](std::string& out, model::NetId plus, model::NetId minus) {
    return net_volts(out, plus, minus);
  };
  leaves_.amperes = [this](std::string& out, model::ElementId source) { return amperes(out, source); };
}

// Names carry the number of the branch and of the copy; the shared ones stand before the first copy and carry no second
// number.
void CopyWriter::name(char letter, std::size_t b) {
  text_.push_back(letter);
  append_index(text_, b);
  text_.push_back('_');
  append_index(text_, local_);
}

void CopyWriter::node(std::uint32_t root) {
  if (root == 0) {
    text_.append(" 0");
    return;
  }
  if (plan_.shared_node_[root]) {
    text_.append(" s");
    append_index(text_, root);
    return;
  }
  text_.append(" n");
  append_index(text_, local_ * network_.node_count + root);
}

std::uint32_t CopyWriter::root(std::size_t b, std::size_t pin) const {
  return roots_[network_.branches[b].nodes[pin].index()];
}

void CopyWriter::pin(std::size_t b, std::size_t pin) {
  node(root(b, pin));
}

void CopyWriter::value(std::size_t b) {
  text_.push_back(' ');
  append_number(text_, plan_.value(b, copy_));
}

void CopyWriter::write_shared() {
  roots_ = plan_.roots_;
  for (std::size_t b = 0; b < network_.branches.size(); ++b) {
    if (!plan_.shared_source_[b]) continue;
    text_.push_back('v');
    append_index(text_, b);
    pin(b, 0);
    pin(b, 1);
    text_.push_back(' ');
    append_number(text_, plan_.own_value(b));
    text_.push_back('\n');
  }
}

std::optional<std::string> CopyWriter::write(std::size_t copy, std::size_t local) {
  copy_ = copy;
  local_ = local;
  const std::vector<std::uint32_t> merged = plan_.roots_of(copy);
  roots_ = merged.empty() ? plan_.roots_ : merged;
  if (!merged.empty() && has_voltage_loop(network_, roots_))
    return "a zero resistance closes a loop of voltage sources";
  for (std::size_t b = 0; b < network_.branches.size() && !trouble_; ++b) write_branch(b);
  if (!trouble_) write_wanted();
  roots_ = plan_.roots_;
  return trouble_;
}

void CopyWriter::write_branch(std::size_t b) {
  std::visit(base::overloaded{
                 [&](const model::Resistor&) { write_resistor(b); },
                 [](const model::Capacitor&) {},
                 [](const model::Inductor&) {},
                 [&](const model::VoltageSource&) { write_source(b, 'v'); },
                 [&](const model::CurrentSource&) { write_source(b, 'i'); },
                 [&](const model::VoltageControlled& part) { write_voltage_controlled(b, part.drives_current); },
                 [&](const model::CurrentControlled& part) { write_current_controlled(b, part.drives_current); },
                 [&](const model::Behavioural& part) { write_behavioural(b, part); },
                 [&](const model::Device& part) { write_device(b, part); },
                 [](const model::Unmodelled&) {},
             },
             network_.branches[b].part);
}

void CopyWriter::write_resistor(std::size_t b) {
  if (ends_joined(b)) return;
  name('r', b);
  pin(b, 0);
  pin(b, 1);
  value(b);
  text_.push_back('\n');
}

void CopyWriter::write_source(std::size_t b, char letter) {
  const bool zero = plan_.value(b, copy_) == 0;
  if (letter == 'i') {
    if (zero || ends_joined(b)) return;
  } else if (ends_joined(b)) {
    if (!zero || plan_.current_wanted_[b]) trouble_ = "a voltage source of the network is shorted";
    return;
  } else if (plan_.shared_source_[b]) {
    return;
  }
  name(letter, b);
  pin(b, 0);
  pin(b, 1);
  value(b);
  text_.push_back('\n');
}

void CopyWriter::write_voltage_controlled(std::size_t b, bool drives_current) {
  if (ends_joined(b)) {
    if (!drives_current) trouble_ = "a voltage source of the network is shorted";
    return;
  }
  name(drives_current ? 'g' : 'e', b);
  for (std::size_t i = 0; i < 4; ++i) pin(b, i);
  value(b);
  text_.push_back('\n');
}

void CopyWriter::write_current_controlled(std::size_t b, bool drives_current) {
  if (ends_joined(b)) {
    if (!drives_current) trouble_ = "a voltage source of the network is shorted";
    return;
  }
  name(drives_current ? 'f' : 'h', b);
  pin(b, 0);
  pin(b, 1);
  text_.push_back(' ');
  name('v', network_.branches[b].through.index());
  value(b);
  text_.push_back('\n');
}

// A source whose expression is a constant at this point is a plain source: its number then keeps all its digits.
void CopyWriter::write_behavioural(std::size_t b, const model::Behavioural& part) {
  if (ends_joined(b)) {
    if (!part.drives_current) trouble_ = "a voltage source of the network is shorted";
    return;
  }
  const double variable = plan_.value(b, copy_);  // NaN where nothing is swept
  const model::ExpressionPool& pool = plan_.circuit_->expressions;
  const auto constant = constant_value(pool, part.expression, variable);
  if (!constant) {
    trouble_ = constant.error();
    return;
  }
  const char letter = part.drives_current ? 'i' : 'v';
  name(constant->has_value() ? letter : 'b', b);
  pin(b, 0);
  pin(b, 1);
  if (constant->has_value()) {
    text_.push_back(' ');
    append_number(text_, **constant);
  } else {
    text_.push_back(' ');
    text_.push_back(letter);
    text_.push_back('=');
    if (auto done = append_expression(text_, pool, part.expression, variable, leaves_); !done) trouble_ = done.error();
  }
  text_.push_back('\n');
}

void CopyWriter::write_device(std::size_t b, const model::Device& part) {
  name(shape_of(plan_.circuit_->models[part.model.index()].type).letter, b);
  for (std::size_t i = 0; i < network_.branches[b].node_count; ++i) pin(b, i);
  text_.append(plan_.device_text_[b]);
  text_.push_back('\n');
}

std::optional<std::uint32_t> CopyWriter::root_of(model::NetId net) const {
  if (net == model::ground) return 0;
  const model::NodeId found = network_.node_of(net);
  if (!found.valid() || found.index() >= roots_.size()) return {};
  return roots_[found.index()];
}

bool CopyWriter::net_volts(std::string& out, model::NetId plus, model::NetId minus) {
  const auto a = root_of(plus);
  const auto b = root_of(minus);
  if (!a || !b) return false;
  if (*a == *b) {
    out.append("0");
    return true;
  }
  const auto name = [&](std::uint32_t root) {
    out.push_back('n');
    append_index(out, local_ * network_.node_count + root);
  };
  if (*a == 0) {
    out.append("(-v(");
    name(*b);
    out.append("))");
    return true;
  }
  out.append("v(");
  name(*a);
  if (*b != 0) {
    out.append(",");
    name(*b);
  }
  out.append(")");
  return true;
}

bool CopyWriter::amperes(std::string& out, model::ElementId source) {
  for (std::size_t b = 0; b < network_.branches.size(); ++b) {
    const model::Branch& branch = network_.branches[b];
    if (branch.element != source || !std::holds_alternative<model::VoltageSource>(branch.part)) continue;
    out.append("i(v");
    append_index(out, b);
    out.push_back('_');
    append_index(out, local_);
    out.push_back(')');
    return true;
  }
  return false;
}

void CopyWriter::write_wanted() {
  for (const model::NodeId watched : plan_.plan_->watched) {
    const std::uint32_t at = roots_[watched.index()];
    if (at == 0) {
      deck_.places.push_back(Deck::zero);
      continue;
    }
    const bool shared = plan_.shared_node_[at];
    deck_.places.push_back(deck_.request.vector_count++);
    vectors_.push_back(shared ? 's' : 'n');
    append_index(vectors_, shared ? at : local_ * network_.node_count + at);
    vectors_.push_back('\n');
  }
  for (const model::BranchId branch : plan_.plan_->watched_currents) {
    deck_.places.push_back(deck_.request.vector_count++);
    vectors_.push_back('v');
    append_index(vectors_, branch.index());
    vectors_.push_back('_');
    append_index(vectors_, local_);
    vectors_.append("#branch\n");
  }
}

}  // namespace simulate

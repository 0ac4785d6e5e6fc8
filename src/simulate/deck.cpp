#include "simulate/deck.hpp"

#include "simulate/copy_writer.hpp"
#include "simulate/numbers.hpp"

namespace simulate {

base::Result<DeckWriter> DeckWriter::prepare(const model::Plan& plan, const model::Circuit& circuit,
                                             const base::NameTable& names) {
  DeckWriter writer(plan, circuit, names);
  if (auto trouble = writer.check_plan()) return base::Error{*trouble};
  writer.settle_overrides();
  if (auto trouble = writer.check_values()) return base::Error{*trouble};
  if (auto trouble = writer.settle_devices()) return base::Error{*trouble};
  writer.settle_shorts();
  writer.settle_currents();
  if (auto trouble = writer.check_paths()) return base::Error{*trouble};
  writer.settle_shared();
  return writer;
}

namespace {

std::string_view options_of(Tolerances tolerances) {
  switch (tolerances) {
    case Tolerances::none:
      break;
    case Tolerances::tight:
      return ".options reltol=1e-9 vntol=1e-12 abstol=1e-15 itl1=500";
    case Tolerances::medium:
      return ".options reltol=1e-6 vntol=1e-9 abstol=1e-15 itl1=500";
  }
  return {};
}

void append_options(std::string& deck, Tolerances tolerances, double temperature) {
  if (tolerances == Tolerances::none) return;
  deck.append(options_of(tolerances));
  if (temperature != 27) {
    deck.append(" temp=");
    append_number(deck, temperature);
  }
  deck.append("\n");
}

}  // namespace

base::Result<Deck> DeckWriter::write(std::size_t first, std::size_t count, Tolerances tolerances) const {
  Deck deck;
  std::string& text = deck.request.deck;
  text.reserve(200 + count * branches() * 32);
  text.append("t\n");
  append_options(text, tolerances, circuit_->temperature);
  text.append(models_);
  CopyWriter copies(*this, deck);
  copies.write_shared();
  for (std::size_t i = 0; i < count; ++i) {
    if (auto trouble = copies.write(first + i, i)) return base::Error{*trouble};
    if (text.size() > most_frame_bytes / 2) return base::Error{"the network is too large for the simulator"};
  }
  text.append(".end\n");
  return deck;
}

}  // namespace simulate

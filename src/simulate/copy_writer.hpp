// Writes the copies of a network into one deck: the inner part of DeckWriter.
#pragma once

#include <optional>
#include <span>
#include <string>

#include "simulate/deck.hpp"
#include "simulate/expression_text.hpp"

namespace simulate {

class CopyWriter {
 public:
  CopyWriter(const DeckWriter& plan, Deck& deck);
  CopyWriter(const CopyWriter&) = delete;
  CopyWriter& operator=(const CopyWriter&) = delete;

  // The sources that all copies share.
  void write_shared();

  // Copy `copy` of the plan as number `local` of this deck. Gives the trouble, if any.
  [[nodiscard]] std::optional<std::string> write(std::size_t copy, std::size_t local);

 private:
  void write_branch(std::size_t b);
  void write_resistor(std::size_t b);
  void write_source(std::size_t b, char letter);
  void write_voltage_controlled(std::size_t b, bool drives_current);
  void write_current_controlled(std::size_t b, bool drives_current);
  void write_behavioural(std::size_t b, const model::Behavioural& part);
  void write_device(std::size_t b, const model::Device& part);
  void write_wanted();

  [[nodiscard]] std::uint32_t root(std::size_t b, std::size_t pin) const;
  [[nodiscard]] bool ends_joined(std::size_t b) const { return root(b, 0) == root(b, 1); }
  void name(char letter, std::size_t b);
  void node(std::uint32_t root);
  void pin(std::size_t b, std::size_t pin);
  void value(std::size_t b);
  [[nodiscard]] bool net_volts(std::string& out, model::NetId plus, model::NetId minus);
  [[nodiscard]] bool amperes(std::string& out, model::ElementId source);
  [[nodiscard]] std::optional<std::uint32_t> root_of(model::NetId net) const;

  const DeckWriter& plan_;
  const model::Network& network_;
  std::string& text_;
  std::string& vectors_;
  Deck& deck_;
  LeafNames leaves_;
  std::span<const std::uint32_t> roots_;
  std::size_t copy_ = 0;
  std::size_t local_ = 0;
  std::optional<std::string> trouble_;
};

}  // namespace simulate

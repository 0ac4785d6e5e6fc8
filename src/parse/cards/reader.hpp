// Reads the cards of a netlist and of the files that it includes, one after the other.
#pragma once

#include <cstddef>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "model/netlist.hpp"
#include "parse/cards/elements.hpp"
#include "parse/cards/text.hpp"
#include "parse/netlist.hpp"

namespace parse {

class CardsReader {
 public:
  CardsReader(source::Sources& sources, base::NameTable& names, const Includer& include, const source::Limits& limits,
              model::Netlist& netlist);

  // Reads the root file with all it includes, then what only the names of the whole netlist decide.
  void read_root(source::SourceId root);

  // All there was to say, in the order of the cards.
  [[nodiscard]] source::Diagnostics diagnostics() &&;

 private:
  // The names that a card would have defined, had it been read.
  struct Unread {
    model::CardId card;
    std::vector<model::Word> parameters;
    base::NameId model;
    base::NameId subcircuit;
  };
  // How far reading is inside one file.
  struct File {
    source::SourceId source;
    std::string_view bytes;
    std::optional<bool> sections;  // whether it holds any, once that was asked
    std::string section;           // of a library: only this is read; empty: all
    bool in_section = false;
    bool in_other_section = false;
    bool section_found = false;
    bool in_control = false;
    model::CardId control;
    std::size_t control_cards = 0;
    std::vector<Unread> control_unread;  // of the block that is open
    bool ended = false;                  // behind .end
    model::CardId first_after_end;
    std::size_t after_end = 0;
    model::CardId first_unused;  // the first analysis or output card
    std::vector<std::string_view> unused;
    std::size_t unused_cards = 0;
    std::uint32_t cut_at = 0;  // a line behind this byte belongs to the card before it and cannot be read
  };
  struct Later {
    model::ScopeId scope;
    std::uint32_t element = 0;
  };
  struct Said {
    model::CardId card;
    source::Diagnostic diagnostic;
  };

  // netlist.cpp
  // False where the section is not in the file.
  bool read_file(source::SourceId id, std::uint32_t begin, std::string section);
  void read_lines(std::uint32_t begin);
  void read_long_line(std::uint32_t begin, std::uint32_t end);
  void read_title(std::string_view title, source::SourceId root);
  [[nodiscard]] bool is_foreign(std::string_view bytes, source::SourceId root);
  void take(const LexedCard& lexed);
  void take_executable(std::uint32_t offset);
  void finish_file();
  void read_later();

  // dot.cpp
  [[nodiscard]] bool is_passed_over(const Card& card, model::CardId id);
  void read_card(Card& card, model::CardId id);
  void read_element_card(Card& card, model::CardId id);
  void read_dot(Card& card, model::CardId id);
  void pass_analysis(const Card& card, model::CardId id);

  // scope.cpp
  void read_subcircuit(Card& card, model::CardId id);
  void read_ends(Card& card, model::CardId id);
  void read_parameters(Card& card, model::CardId id);
  void read_model(Card& card, model::CardId id);
  void read_global(Card& card, model::CardId id);

  // unread.cpp
  void set_fault(model::CardId id, source::Span where, std::string reason, model::CardId cause);
  void fail_behind(model::CardId first);
  [[nodiscard]] std::vector<model::Word> given_names(const Card& card);
  [[nodiscard]] Unread unread(const Card& card, model::CardId id);
  void leave_broken(const Unread& unread, model::ScopeId scope);
  void close_scopes();
  void fail_control();

  // duplicates.cpp
  struct Defined {
    base::NameId name;
    model::CardId first;
    model::CardId last;
    bool broken = false;
  };
  void find_duplicates();
  void compare(std::string_view what, const Defined& first, Defined& again);
  [[nodiscard]] std::string text_of(model::CardId first, model::CardId last) const;

  // include.cpp
  void read_include(Card& card, model::CardId id);
  void read_library(Card& card, model::CardId id);
  void read_endl(Card& card, model::CardId id);
  void include_file(Card& card, model::CardId id, std::size_t first, std::size_t last, std::string section);
  void say_missing(model::CardId id, source::Span where, std::string what);
  [[nodiscard]] bool may_include(Card& card, source::SourceId wanted);

  model::CardId add_card(std::uint32_t begin, std::uint32_t end, model::CardFate fate);
  void say(base::Level level, model::CardId card, source::Span where, std::string message);
  void say_fault(const Card& card, model::CardId id);
  void set_fate(model::CardId id, model::CardFate fate) { netlist_.cards[id.index()].fate = fate; }
  [[nodiscard]] model::Scope& scope() { return netlist_.scopes[open_.back().index()]; }
  [[nodiscard]] File& file() { return files_.back(); }

  source::Sources& sources_;
  const Includer& include_;
  const source::Limits& limits_;
  model::Netlist& netlist_;
  Reading reading_;
  std::vector<File> files_;           // each includes the next
  std::vector<model::ScopeId> open_;  // the top level, then each open subcircuit
  std::vector<Later> later_;
  std::vector<Said> said_;
  std::size_t includes_ = 0;
  std::size_t conditionals_ = 0;  // open .if
  model::CardId conditional_;     // the outermost of them
  bool nesting_told_ = false;
  std::size_t same_ = 0;     // definitions that stand twice with the same text
  model::CardId same_card_;  // the first of them
};

}  // namespace parse

// Builds an expression tree from operands and operators in the order of the text.
#pragma once

#include <cstddef>
#include <cstdint>
#include <string>
#include <string_view>
#include <vector>

#include "base/names.hpp"
#include "model/expression.hpp"

namespace parse {

// Thrown by the builder and by the grammar's control; read_expression catches it.
struct ExpressionFailure {
  std::uint32_t offset;
  std::string message;
};

// Operators wait until one that binds less tightly comes (the two-stack method of operator precedence), so that no
// chain of operators costs stack. Every operand knows its depth: what reads trees later may recurse that far and no
// further.
class TreeBuilder {
 public:
  TreeBuilder(model::ExpressionPool& pool, base::NameTable& names, std::uint64_t depth);

  void number(std::string_view text, std::uint32_t offset);
  void name(std::string_view text, std::uint32_t offset);
  void volts(std::string_view net, std::string_view second_net, std::uint32_t offset);
  void amperes(std::string_view source, std::uint32_t offset);
  void prefix(char sign, std::uint32_t offset);
  void infix(std::string_view sign, std::uint32_t offset);
  void open(std::uint32_t offset);  // a bracket
  void close();
  void open_call(std::string_view function, std::uint32_t offset);
  void next_argument();
  void close_call(bool empty);

  // The root, once the text has ended.
  [[nodiscard]] model::ExpressionId finish();

 private:
  struct Operand {
    model::ExpressionId id;
    std::uint64_t depth = 0;
  };
  enum class Kind : std::uint8_t { prefix, infix, question, colon, bracket, call };
  struct Pending {
    Kind kind = Kind::infix;
    model::Op op = model::Op::add;
    int binding = 0;
    std::uint32_t offset = 0;
    std::size_t operands = 0;   // call: how many operands stood before its first argument
    std::string_view function;  // call
  };

  void push(const model::ExpressionNode& node, std::uint64_t depth);
  void combine(model::ExpressionNode node, std::size_t count, std::uint32_t offset);
  void reduce();
  void reduce_to_mark();
  void colon(std::uint32_t offset);
  void mark(Pending pending);
  void build_call(const Pending& call, std::size_t count);

  model::ExpressionPool& pool_;
  base::NameTable& names_;
  std::uint64_t depth_;
  std::uint64_t marks_ = 0;
  std::vector<Operand> operands_;
  std::vector<Pending> pending_;
};

}  // namespace parse

// What goes wrong while flattening, said once however many instances have it.
#pragma once

#include <cstdint>
#include <string>
#include <unordered_map>
#include <vector>

#include "base/names.hpp"
#include "model/circuit.hpp"
#include "source/diagnostic.hpp"

namespace flatten {

// Two problems of one kind at one place are the same problem.
enum class ProblemKind : std::uint8_t {
  duplicate,
  value,
  parameter,
  missing_argument,
  unknown_argument,
  pins,
  recursion,
  limit,
  source,
  model,
  device
};

class Problems {
 public:
  // Notes a problem of an instance, or of the top level where `instance` is none.
  void say(ProblemKind kind, base::Level level, source::Span where, model::InstanceId instance, std::string message);

  // Hands the problems over in the order in which they were first met, with the instances that have them.
  void tell(const std::vector<model::Instance>& instances, const base::NameTable& names,
            source::Diagnostics& diagnostics) const;

 private:
  struct Problem {
    source::Diagnostic diagnostic;
    std::size_t instances = 0;
    model::InstanceId example;
    model::InstanceId latest;
  };

  std::vector<Problem> problems_;
  std::unordered_map<std::uint64_t, std::vector<std::size_t>> at_;  // by place, then few kinds each
  std::vector<ProblemKind> kinds_;
};

}  // namespace flatten

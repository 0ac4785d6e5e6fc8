#include "flatten/problems.hpp"

#include <fmt/format.h>

#include "base/text.hpp"

namespace flatten {

void Problems::say(ProblemKind kind, base::Level level, source::Span where, model::InstanceId instance,
                   std::string message) {
  const std::uint64_t place = (std::uint64_t{where.begin.source.value} << 32U) | where.begin.offset;
  std::vector<std::size_t>& here = at_[place];
  for (const std::size_t index : here) {
    if (kinds_[index] != kind) continue;
    Problem& known = problems_[index];
    if (known.latest != instance) ++known.instances;
    known.latest = instance;
    return;
  }
  here.push_back(problems_.size());
  problems_.push_back({{level, where, std::move(message)}, 1, instance, instance});
  kinds_.push_back(kind);
}

void Problems::tell(const std::vector<model::Instance>& instances, const base::NameTable& names,
                    source::Diagnostics& diagnostics) const {
  for (const Problem& problem : problems_) {
    source::Diagnostic diagnostic = problem.diagnostic;
    if (problem.example.valid()) {
      const std::string path = base::printable_short(names.text(instances[problem.example.index()].name));
      if (problem.instances == 1)
        diagnostic.message += fmt::format(" (in {})", path);
      else
        diagnostic.message += fmt::format(" (in {} instances, e.g. {})", problem.instances, path);
    }
    diagnostics.push_back(std::move(diagnostic));
  }
}

}  // namespace flatten

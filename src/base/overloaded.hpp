// One visitor out of several lambdas; a new alternative in a variant then breaks the build where it matters.
#pragma once

namespace base {

template <class... Callables>
struct overloaded : Callables... {
  using Callables::operator()...;
};
template <class... Callables>
overloaded(Callables...) -> overloaded<Callables...>;

}  // namespace base

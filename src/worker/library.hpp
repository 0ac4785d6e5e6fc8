// The circuit simulator, as a shared library with global state: one a process.
#pragma once

#include <functional>
#include <string>

#include "simulate/protocol.hpp"

namespace worker {

// Called when the library asks for its own end, with what it said. It must not return: the library is unusable from
// then on.
using OnExit = void (*)(const std::string& text);

// Loads the library's start-up state. False: it refused.
[[nodiscard]] bool start_library(OnExit on_exit);

// "ngspice-39", as the library says of itself at its start; "ngspice" when it does not say.
[[nodiscard]] std::string library_name();

// Solves one deck and forgets it. Return codes mean little, so an answer counts as solved only when the library said
// nothing unexpected, made a new plot, and every wanted vector is there, of length 1 and finite.
[[nodiscard]] simulate::Answer solve(simulate::Request& request);

}  // namespace worker

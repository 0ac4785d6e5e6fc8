// What keeps the process small, alone and short-lived.
#pragma once

namespace worker {

// The process ends when its parent does. False: `parent` is gone already, or the system refuses.
[[nodiscard]] bool die_with_parent(long parent);

// Limits that hold from the start: memory, processor time, no core file, no file of any size.
[[nodiscard]] bool limit_resources(unsigned long cpu_seconds);

// What is given up once the library has read all that it reads and has solved its first deck: nothing can be opened any
// more.
[[nodiscard]] bool close_doors();

}  // namespace worker

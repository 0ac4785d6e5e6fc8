// Golden files: what a report looked like when somebody last read it and found it good.
#pragma once

#include <string>

// The text of tests/report/golden/NAME. With TAPSPAN_ACCEPT=1 in the environment a file that differs from `now` is
// first rewritten with it, and the difference is then read in version control before it is kept.
[[nodiscard]] std::string golden(const std::string& name, const std::string& now);

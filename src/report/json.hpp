// The JSON report, schema "tapspan.report/1": stable keys, full double precision, the same bytes for the same input.
#pragma once

#include <string>

#include "model/report.hpp"

namespace report {

// A document that ends with a line feed. Bytes of names that are not UTF-8 are replaced by U+FFFD.
[[nodiscard]] std::string json(const model::RunReport& report);

}  // namespace report

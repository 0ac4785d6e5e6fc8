// The points of a sweep as JSON text.
#pragma once

#include <string>

#include "model/sweep.hpp"

namespace report {

// Appends "points": [...] to `out`, one point a line, numbers in the shortest form that reads back the same. What is
// not finite is left out.
void append_points(const model::Sweep& sweep, std::string& out);

}  // namespace report

#include "report/json.hpp"

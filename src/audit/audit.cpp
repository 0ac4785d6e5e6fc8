#include "audit/audit.hpp"

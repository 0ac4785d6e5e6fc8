#include "parse/quantity.hpp"

#include "flatten/flatten.hpp"

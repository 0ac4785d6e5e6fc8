#include "network/linear.hpp"

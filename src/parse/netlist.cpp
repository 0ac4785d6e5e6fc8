#include "parse/netlist.hpp"

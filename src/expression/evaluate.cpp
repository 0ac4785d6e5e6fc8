#include "expression/evaluate.hpp"

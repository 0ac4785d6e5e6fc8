#include "advise/reach.hpp"

#include "source/diagnostic.hpp"

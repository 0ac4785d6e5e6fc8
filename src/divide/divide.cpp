#include "divide/divide.hpp"

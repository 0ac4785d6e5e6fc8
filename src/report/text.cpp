#include "report/text.hpp"

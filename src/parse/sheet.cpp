#include "parse/sheet.hpp"

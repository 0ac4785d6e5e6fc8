#include "sensor/law.hpp"

#include "simulate/session.hpp"

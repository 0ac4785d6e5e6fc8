#include "judge/judge.hpp"

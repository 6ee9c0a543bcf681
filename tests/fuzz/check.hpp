// What a fuzz target holds to be true of any input.
#pragma once

#include <cstdio>
#include <cstdlib>

// Says what broke and stops: the fuzzer keeps the input, the replay fails.
#define STEELYARD_FUZZ_CHECK(condition)                                                      \
  do {                                                                                       \
    if (!(condition)) {                                                                      \
      std::fprintf(stderr, "%s:%d: this should hold: %s\n", __FILE__, __LINE__, #condition); \
      std::abort();                                                                          \
    }                                                                                        \
  } while (false)

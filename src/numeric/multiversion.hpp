// One function, compiled for several instruction sets and chosen when the program starts.
#pragma once

// Only on a static function behind a plain wrapper: clang 14 doesn't link other uses. Not under
// sanitizers, whose runtime isn't ready when the choice is made.
#if defined(__has_feature)
#if __has_feature(address_sanitizer) || __has_feature(undefined_behavior_sanitizer) || \
    __has_feature(memory_sanitizer)
#define STEELYARD_NO_MULTIVERSION
#endif
#endif
#if defined(__SANITIZE_ADDRESS__) || !defined(__x86_64__) || !defined(__linux__) || \
    defined(STEELYARD_BASELINE)
#define STEELYARD_NO_MULTIVERSION
#endif

#if defined(STEELYARD_NO_MULTIVERSION)
#define STEELYARD_MULTIVERSION
#elif defined(__clang__)
#define STEELYARD_MULTIVERSION __attribute__((target_clones("avx512f", "avx2", "default")))
#else
#define STEELYARD_MULTIVERSION __attribute__((target_clones("arch=x86-64-v4", "arch=x86-64-v3", "default")))
#endif

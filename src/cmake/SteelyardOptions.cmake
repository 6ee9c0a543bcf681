# Compiler options that every target of the project shares.
include(GNUInstallDirs)

add_library(steelyard_options INTERFACE)
target_compile_features(steelyard_options INTERFACE cxx_std_20)
# The same bits on every instruction set and optimization level: no contraction into fused
# multiply-adds, no value-changing float options. errno and traps are never looked at; saying so
# changes no value and lets the loops vectorize.
target_compile_options(steelyard_options INTERFACE
  -ffp-contract=off -fno-math-errno -fno-trapping-math
  -Wall -Wextra -Wpedantic -Wconversion -Wshadow
  # gcc 12 sees overlaps that aren't there in `"..." + std::string` (gcc bug 105651, mended in 13).
  $<$<AND:$<CXX_COMPILER_ID:GNU>,$<VERSION_LESS:$<CXX_COMPILER_VERSION>,13>>:-Wno-restrict>
  $<$<AND:$<CXX_COMPILER_ID:GNU>,$<VERSION_LESS:$<CXX_COMPILER_VERSION>,13>>:-Wno-maybe-uninitialized>
  $<$<BOOL:${STEELYARD_WERROR}>:-Werror>
  $<$<BOOL:${STEELYARD_SANITIZE}>:-fsanitize=address,undefined -fno-sanitize-recover=all -fno-omit-frame-pointer>
  $<$<BOOL:${STEELYARD_FUZZ}>:-fsanitize=fuzzer-no-link,address,undefined -fno-sanitize-recover=all -fno-omit-frame-pointer>
  $<$<BOOL:${STEELYARD_COVERAGE}>:--coverage -fprofile-update=atomic>)
target_link_options(steelyard_options INTERFACE
  $<$<BOOL:${STEELYARD_SANITIZE}>:-fsanitize=address,undefined>
  $<$<BOOL:${STEELYARD_FUZZ}>:-fsanitize=address,undefined>
  $<$<BOOL:${STEELYARD_COVERAGE}>:--coverage>)
set(CMAKE_CXX_EXTENSIONS OFF)
set(CMAKE_POSITION_INDEPENDENT_CODE ON)

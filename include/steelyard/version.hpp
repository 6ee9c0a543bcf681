// The version number; CMake reads it from here.
#pragma once

#define STEELYARD_VERSION_MAJOR 0
#define STEELYARD_VERSION_MINOR 1
#define STEELYARD_VERSION_PATCH 0
#define STEELYARD_VERSION "0.1.0"

// SPDX-License-Identifier: Apache-2.0
// The one main of all Catch2 programs.
#define CATCH_CONFIG_MAIN
#include <catch2/catch.hpp>

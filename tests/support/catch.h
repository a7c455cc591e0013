// SPDX-License-Identifier: Apache-2.0
// The one door to Catch2: version 2 (Debian 12) and 3 (Debian 13) look the same from here on.
#pragma once

#if WHORL_CATCH_MAJOR >= 3
#include <catch2/catch_all.hpp>
using Catch::Approx;
#else
#include <catch2/catch.hpp>
#endif

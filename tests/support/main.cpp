// SPDX-License-Identifier: Apache-2.0
// Runs every test and closes with the plain line "N passed, N failed".
#if WHORL_CATCH_MAJOR < 3
#define CATCH_CONFIG_RUNNER
#endif
#include "support/catch.h"

int main(int argc, char** argv) { return Catch::Session().run(argc, argv); }

// SPDX-License-Identifier: Apache-2.0
// The command's entry point.
#include "app/run.h"

int main(int argc, char** argv) { return whorl::app::run(argc, argv); }

// SPDX-License-Identifier: Apache-2.0
// The command's entry point.
int main() { return 0; }

// SPDX-License-Identifier: Apache-2.0
// The list of files in the making, readable from a signal handler.
#pragma once

#include <string>

namespace whorl::diagnostics {

/// Puts `path` on the list, to be removed should a signal end the process. False where it is on the list already.
/// Does not return once the process is ending.
bool list_unfinished(const std::string& path);
/// Takes it off again.
void unlist_unfinished(const std::string& path);
/// Waits for the end where a signal handler has begun to remove files; returns at once otherwise. To be asked after
/// a listed file was made: the handler may have passed its entry before the file was there.
void stop_if_ending(const std::string& made_path);

}  // namespace whorl::diagnostics

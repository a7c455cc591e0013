// SPDX-License-Identifier: Apache-2.0
// Files that appear under their final name only when they are whole.
#pragma once

#include <filesystem>
#include <string_view>

namespace whorl::diagnostics {

/// A file in the making: written beside its final place under a hidden name that keeps the extension, flushed and renamed by
/// `commit`. Destroyed before that, it leaves nothing behind, and neither does a process ended by SIGINT or SIGTERM
/// (after `remove_unfinished_on_signals`).
class WholeFile {
 public:
  /// Throws FileTrouble where the folder is missing or cannot be written to.
  explicit WholeFile(std::filesystem::path final_path);
  ~WholeFile();
  WholeFile(const WholeFile&) = delete;
  WholeFile& operator=(const WholeFile&) = delete;

  /// Where to write now: `.NAME.PID.part.EXT` in the same folder (image libraries choose the format by extension).
  const std::filesystem::path& working_path() const { return working_; }
  /// Flushes to disk and renames. Throws FileTrouble; the earlier file of that name is then untouched.
  void commit();

 private:
  std::filesystem::path final_, working_;
  bool committed_ = false;
};

/// Writes `bytes` to `path` as one whole file. Throws FileTrouble.
void write_whole_file(const std::filesystem::path& path, std::string_view bytes);

/// From now on SIGINT, SIGTERM and SIGHUP remove unfinished files and end the process by that same signal.
void remove_unfinished_on_signals();

}  // namespace whorl::diagnostics

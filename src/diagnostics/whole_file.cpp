// SPDX-License-Identifier: Apache-2.0
// Writes beside the final place, flushes file and folder, renames.
#include "diagnostics/whole_file.h"

#include "diagnostics/error.h"
#include "diagnostics/unfinished_files.h"

#include <fmt/format.h>

#include <cerrno>
#include <system_error>
#include <utility>

#include <fcntl.h>
#include <sys/stat.h>
#include <unistd.h>

namespace whorl::diagnostics {
namespace {

std::string reason(int error_number) { return std::generic_category().message(error_number); }

std::filesystem::path folder_of(const std::filesystem::path& path) {
  return path.has_parent_path() ? path.parent_path() : std::filesystem::path(".");
}

std::filesystem::path working_path_for(const std::filesystem::path& path) {
  return folder_of(path) / fmt::format(".{}.{}.part{}", path.stem().string(), getpid(), path.extension().string());
}

/// Makes an empty file. One left by a process of the same number that was killed is replaced.
int make_empty(const std::string& path) {
  constexpr int kFlags = O_WRONLY | O_CREAT | O_EXCL | O_CLOEXEC;
  constexpr mode_t kMode = 0666;  // the user's umask takes away what it will
  int fd = open(path.c_str(), kFlags, kMode);
  if (fd < 0 && errno == EEXIST && unlink(path.c_str()) == 0) fd = open(path.c_str(), kFlags, kMode);
  return fd;
}

/// 0, or the error number. Flushing needs no right to write.
int flush(const std::filesystem::path& path, int flags) {
  const int fd = open(path.c_str(), O_RDONLY | O_CLOEXEC | flags);
  if (fd < 0) return errno;
  const int error_number = fsync(fd) == 0 ? 0 : errno;
  close(fd);
  return error_number;
}

void write_all(const WholeFile& file, const std::filesystem::path& final_path, std::string_view bytes) {
  const int fd = open(file.working_path().c_str(), O_WRONLY | O_CLOEXEC);
  if (fd < 0) throw FileTrouble(fmt::format("cannot write {}: {}", final_path.string(), reason(errno)));
  while (!bytes.empty()) {
    const ssize_t written = write(fd, bytes.data(), bytes.size());
    if (written < 0 && errno == EINTR) continue;
    if (written < 0) {
      const int error_number = errno;
      close(fd);
      throw FileTrouble(fmt::format("cannot write {}: {}", final_path.string(), reason(error_number)));
    }
    bytes.remove_prefix(static_cast<std::size_t>(written));
  }
  if (close(fd) != 0 && errno != EINTR) {
    throw FileTrouble(fmt::format("cannot write {}: {}", final_path.string(), reason(errno)));
  }
}

}  // namespace

WholeFile::WholeFile(std::filesystem::path final_path) : final_(std::move(final_path)) {
  if (final_.filename().empty() || final_.filename() == "." || final_.filename() == "..") {
    throw FileTrouble(fmt::format("cannot write {}: this names a folder, a file name is wanted", final_.string()));
  }
  struct stat there = {};
  // Renaming over a device or a folder would destroy or miss it.
  if (stat(final_.c_str(), &there) == 0 && !S_ISREG(there.st_mode)) {
    throw FileTrouble(fmt::format("cannot write {}: there is {} of that name", final_.string(),
                                  S_ISDIR(there.st_mode) ? "a folder" : "something other than a plain file"));
  }
  working_ = working_path_for(final_);
  const Uninterrupted uninterrupted;
  if (!list_unfinished(uninterrupted, working_.string())) {
    throw FileTrouble(fmt::format("cannot write {}: this program is writing it already", final_.string()));
  }
  const int fd = make_empty(working_.string());
  if (fd < 0) {
    const int error_number = errno;
    unlist_unfinished(uninterrupted, working_.string());
    throw FileTrouble(fmt::format("cannot write {} in the folder {}: {}", final_.filename().string(),
                                  folder_of(final_).string(), reason(error_number)));
  }
  close(fd);
}

WholeFile::~WholeFile() {
  if (committed_) return;
  const Uninterrupted uninterrupted;
  unlink(working_.c_str());
  unlist_unfinished(uninterrupted, working_.string());
}

void WholeFile::commit() {
  if (committed_) return;
  if (const int error_number = flush(working_, 0); error_number != 0) {
    throw FileTrouble(fmt::format("cannot flush {} to disk: {}", final_.string(), reason(error_number)));
  }
  {
    const Uninterrupted uninterrupted;
    if (rename(working_.c_str(), final_.c_str()) != 0) {
      throw FileTrouble(fmt::format("cannot give {} its final name: {}", final_.string(), reason(errno)));
    }
    committed_ = true;
    unlist_unfinished(uninterrupted, working_.string());
  }
  // The file is in its place by now. Some file systems cannot flush a folder; that is no failure of ours.
  flush(folder_of(final_), O_DIRECTORY);
}

void write_whole_file(const std::filesystem::path& path, std::string_view bytes) {
  WholeFile file(path);
  write_all(file, path, bytes);
  file.commit();
}

}  // namespace whorl::diagnostics

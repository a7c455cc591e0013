// SPDX-License-Identifier: Apache-2.0
// Fetches a file in bounded memory and says what is not text.
#include "specimen/scene_bytes.h"

#include "specimen/text_check.h"

#include <fmt/format.h>

#include <cerrno>
#include <system_error>

#include <fcntl.h>
#include <sys/stat.h>
#include <unistd.h>

namespace whorl::specimen {
namespace {

using diagnostics::FileTrouble;

std::string reason(int error_number) { return std::generic_category().message(error_number); }

class OpenFile {
 public:
  explicit OpenFile(const std::string& path)
      : name_(path == "-" ? "standard input" : path),
        fd_(path == "-" ? STDIN_FILENO : open(path.c_str(), O_RDONLY | O_CLOEXEC)) {
    if (fd_ < 0) throw FileTrouble(fmt::format("cannot open {}: {}", name_, reason(errno)));
  }
  ~OpenFile() {
    if (fd_ != STDIN_FILENO) close(fd_);
  }
  OpenFile(const OpenFile&) = delete;
  OpenFile& operator=(const OpenFile&) = delete;

  /// Bytes read, 0 at the end.
  std::size_t read_some(char* to, std::size_t most) {
    for (;;) {
      const ssize_t count = read(fd_, to, most);
      if (count >= 0) return static_cast<std::size_t>(count);
      if (errno == EISDIR)
        throw FileTrouble(fmt::format("cannot read {}: it is a folder; a file is wanted", name_));
      if (errno != EINTR) throw FileTrouble(fmt::format("cannot read {}: {}", name_, reason(errno)));
    }
  }

 private:
  std::string name_;
  int fd_;
};

std::string_view without_byte_order_mark(std::string_view bytes) {
  return bytes.starts_with("\xEF\xBB\xBF") ? bytes.substr(3) : bytes;
}

void check_lines(std::string_view bytes, ProblemList& problems) {
  for (std::size_t start = 0; start < bytes.size();) {
    const std::size_t end = std::min(bytes.find('\n', start), bytes.size());
    if (end - start > kLongestLine) {
      problems.add(position_at(bytes, start),
                   fmt::format("this line has {} bytes; a line may have at most {}", end - start, kLongestLine));
    }
    start = end + 1;
  }
}

}  // namespace

std::string fetch_bytes(const std::string& path) {
  OpenFile file(path);
  std::string bytes(kLargestScene + 1, '\0');
  std::size_t length = 0;
  while (length < bytes.size()) {
    const std::size_t count = file.read_some(bytes.data() + length, bytes.size() - length);
    if (count == 0) break;
    length += count;
  }
  bytes.resize(length);
  return bytes;
}

void check_bytes(std::string_view bytes, ProblemList& problems, const FileKind& kind) {
  if (bytes.size() > kLargestScene) {
    problems.add({}, fmt::format("the file is larger than 1 MiB; a {} has a few thousand bytes, is this the right file?",
                                 kind.name));
  } else if (bytes.empty()) {
    problems.add({}, fmt::format("the file is empty; {}", kind.beginning));
  } else if (bytes.starts_with("\xFF\xFE") || bytes.starts_with("\xFE\xFF")) {
    problems.add({}, "the file is UTF-16; save it with the encoding UTF-8");
  } else if (without_byte_order_mark(bytes).find_first_not_of(" \t\r\n") == std::string_view::npos) {
    problems.add({}, fmt::format("the file is blank; {}", kind.beginning));
  } else if (const std::size_t nul = bytes.find('\0'); nul != std::string_view::npos) {
    problems.add(position_at(bytes, nul),
                 fmt::format("the file holds a NUL byte: it is binary, not a text; a {} is a text", kind.name));
  } else if (const auto bad = first_bad_byte(bytes)) {
    problems.add(position_at(bytes, *bad),
                 fmt::format("byte 0x{:02x} is not UTF-8; save the file with the encoding UTF-8",
                             static_cast<unsigned char>(bytes[*bad])));
  } else {
    check_lines(bytes, problems);
  }
}

}  // namespace whorl::specimen

#include "output_file.hpp"

#include <fcntl.h>
#include <fmt/format.h>
#include <unistd.h>

#include <algorithm>
#include <cerrno>
#include <cstring>
#include <filesystem>
#include <ostream>

#include "brink/base/error.hpp"

namespace brink::cli {

namespace {

namespace fs = std::filesystem;

Error file_error(const std::string& path, std::string_view what) {
  return Error(ErrorKind::file, Place{.file = printable(path, 400)}, what);
}

Error system_error(const std::string& path, std::string_view what, int code) {
  return file_error(path, fmt::format("{}: {}", what, std::strerror(code)));
}

// Writes everything or returns the error code.
int write_all(int descriptor, std::string_view bytes) {
  while (!bytes.empty()) {
    const ssize_t written = ::write(descriptor, bytes.data(), bytes.size());
    if (written < 0 && errno == EINTR) continue;
    if (written < 0) return errno;
    bytes.remove_prefix(static_cast<std::size_t>(written));
  }
  return 0;
}

// `flags` beside O_WRONLY; `shown` is the name for the message.
void write_through(const fs::path& path, int flags, std::string_view bytes,
                   const std::string& shown) {
  constexpr mode_t everyone_by_umask = 0666;
  const int descriptor = ::open(path.c_str(), O_WRONLY | O_CLOEXEC | flags, everyone_by_umask);
  if (descriptor < 0) throw system_error(shown, "cannot be written", errno);
  int code = write_all(descriptor, bytes);
  if (::close(descriptor) != 0 && code == 0) code = errno;
  if (code == 0) return;
  if ((flags & O_EXCL) != 0) ::unlink(path.c_str());
  throw system_error(shown, "cannot be written", code);
}

void refuse_inputs(const fs::path& target, const std::vector<std::string>& inputs,
                   const std::string& shown) {
  for (const std::string& input : inputs) {
    std::error_code unknown;  // a file that cannot be looked at is not the same file
    if (input != "-" && fs::equivalent(target, input, unknown)) {
      throw file_error(shown, "is one of the files read, and is not overwritten");
    }
  }
}

fs::path folder_of(const fs::path& path) {
  const fs::path parent = path.parent_path();
  return parent.empty() ? fs::path(".") : parent;
}

void require_folder(const fs::path& folder, const std::string& shown) {
  std::error_code unknown;
  if (!fs::is_directory(folder, unknown)) {
    throw file_error(shown,
                     fmt::format("cannot be written: there is no folder '{}'", folder.string()));
  }
}

// A name beside `target` that no other run of the program uses.
fs::path temporary_beside(const fs::path& target) {
  return folder_of(target) / fmt::format(".{}.{}", target.filename().string(), ::getpid());
}

void rename_over(const fs::path& from, const fs::path& to, const std::string& shown) {
  std::error_code failure;
  fs::rename(from, to, failure);
  if (!failure) return;
  std::error_code ignored;
  fs::remove(from, ignored);
  throw system_error(shown, "cannot be written", failure.value());
}

// Removes the temporary folder, whatever happens.
class TemporaryFolder {
 public:
  TemporaryFolder(fs::path path, const std::string& shown) : path_(std::move(path)) {
    std::error_code failure;
    fs::create_directory(path_, failure);
    if (failure) throw system_error(shown, "cannot be made", failure.value());
  }
  ~TemporaryFolder() {
    std::error_code ignored;
    fs::remove_all(path_, ignored);
  }
  TemporaryFolder(const TemporaryFolder&) = delete;
  TemporaryFolder& operator=(const TemporaryFolder&) = delete;
  const fs::path& path() const { return path_; }

 private:
  fs::path path_;
};

}  // namespace

void write_file(const std::string& path, std::string_view bytes,
                const std::vector<std::string>& inputs) {
  std::error_code unknown;
  const fs::file_status status = fs::status(path, unknown);
  if (fs::is_directory(status)) throw file_error(path, "is a folder; a file is wanted");
  refuse_inputs(path, inputs, path);
  if (fs::exists(status) && !fs::is_regular_file(status)) {
    write_through(path, 0, bytes, path);
    return;
  }
  // Through a link the file it names is replaced, not the link.
  fs::path target = fs::exists(status) ? fs::canonical(path, unknown) : fs::path(path);
  if (target.empty()) target = path;
  require_folder(folder_of(target), path);
  const fs::path temporary = temporary_beside(target);
  write_through(temporary, O_CREAT | O_EXCL, bytes, path);
  if (fs::exists(status)) fs::permissions(temporary, status.permissions(), unknown);
  rename_over(temporary, target, path);
}

void write_output(const std::string& path, std::string_view bytes, std::ostream& out,
                  const std::vector<std::string>& inputs) {
  if (path == "-") {
    out.write(bytes.data(), static_cast<std::streamsize>(bytes.size()));
  } else {
    write_file(path, bytes, inputs);
  }
}

void write_folder(const std::string& folder, const std::vector<NamedFile>& files,
                  const std::vector<std::string>& inputs) {
  fs::path target = fs::path(folder).lexically_normal();
  if (!target.has_filename()) target = target.parent_path();
  std::error_code failure;
  if (fs::exists(target, failure) && !fs::is_directory(target, failure)) {
    throw file_error(folder, "is a file; a folder is wanted");
  }
  for (const NamedFile& file : files) refuse_inputs(target / file.name, inputs, file.name);
  fs::create_directories(folder_of(target), failure);
  if (failure) throw system_error(folder, "cannot be made", failure.value());
  const TemporaryFolder temporary(temporary_beside(target), folder);
  for (const NamedFile& file : files) {
    write_through(temporary.path() / file.name, O_CREAT | O_EXCL, file.bytes, folder);
  }
  fs::create_directory(target, failure);
  if (failure) throw system_error(folder, "cannot be made", failure.value());
  for (const NamedFile& file : files) {
    rename_over(temporary.path() / file.name, target / file.name, (target / file.name).string());
  }
}

std::string known_ending(const std::string& option, const std::string& path,
                         const std::vector<std::string>& endings) {
  std::string ending = fs::path(path).extension().string();
  std::transform(ending.begin(), ending.end(), ending.begin(), [](char c) {
    return c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c;
  });
  if (std::find(endings.begin(), endings.end(), ending) != endings.end()) return ending;
  std::string list;
  for (const std::string& known : endings) list += (list.empty() ? "" : ", ") + known;
  throw Error(ErrorKind::argument, Place{.key = option}, "has no known ending", path,
              "a name ending in " + list);
}

}  // namespace brink::cli

// Output files, whole or not at all.
#pragma once

#include <iosfwd>
#include <string>
#include <string_view>
#include <vector>

namespace brink::cli {

// Writes `bytes` to a temporary file beside `path`, then renames it over: a reader sees the old
// file or the new one, whole. A device such as /dev/null is written straight. Refuses to overwrite
// one of `inputs` (the files this run reads; "-" is none). Throws ErrorKind::file naming path and
// reason.
void write_file(const std::string& path, std::string_view bytes,
                const std::vector<std::string>& inputs = {});

// The same, where "-" means standard output.
void write_output(const std::string& path, std::string_view bytes, std::ostream& out,
                  const std::vector<std::string>& inputs = {});

struct NamedFile {
  std::string name;  // without folders
  std::string bytes;
};

// Writes all `files` into the folder, made where it is missing: they are written complete into a
// temporary folder beside it first and moved in only then. Throws as write_file; a failure before
// the move leaves nothing behind.
void write_folder(const std::string& folder, const std::vector<NamedFile>& files,
                  const std::vector<std::string>& inputs = {});

// The ending of `path` in lower case (".svg"), which has to be one of `endings`; throws
// ErrorKind::argument naming `option` and the endings otherwise.
std::string known_ending(const std::string& option, const std::string& path,
                         const std::vector<std::string>& endings);

}  // namespace brink::cli

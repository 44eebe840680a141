#include "support/run_process.hpp"

#include <fcntl.h>
#include <sys/wait.h>
#include <unistd.h>

#include <cstdlib>
#include <fstream>
#include <sstream>
#include <stdexcept>

namespace brink::testing {

namespace {

std::string read_whole(const std::string& path) {
  std::ostringstream bytes;
  bytes << std::ifstream(path, std::ios::binary).rdbuf();
  return bytes.str();
}

void redirect(const std::string& path, int flags, int descriptor) {
  constexpr mode_t own = 0600;
  const int file = ::open(path.c_str(), flags, own);
  if (file < 0 || ::dup2(file, descriptor) < 0) ::_exit(126);
}

// In the child: never returns.
[[noreturn]] void become(const std::vector<std::string>& command, const std::string& folder,
                         const std::string& scratch, const std::vector<std::string>& environment) {
  redirect(scratch + "/in", O_RDONLY, STDIN_FILENO);
  redirect(scratch + "/out", O_WRONLY | O_CREAT | O_TRUNC, STDOUT_FILENO);
  redirect(scratch + "/err", O_WRONLY | O_CREAT | O_TRUNC, STDERR_FILENO);
  if (::chdir(folder.c_str()) != 0) ::_exit(126);
  for (const std::string& setting : environment) {
    const std::size_t equals = setting.find('=');
    ::setenv(setting.substr(0, equals).c_str(), setting.substr(equals + 1).c_str(), 1);
  }
  std::vector<char*> words;
  for (const std::string& word : command) words.push_back(const_cast<char*>(word.c_str()));
  words.push_back(nullptr);
  ::execv(words[0], words.data());
  ::_exit(127);
}

}  // namespace

ProcessOutcome run_process(const std::vector<std::string>& command, const std::string& folder,
                           const std::string& scratch, const std::string& input,
                           const std::vector<std::string>& environment) {
  std::ofstream(scratch + "/in", std::ios::binary) << input;
  const pid_t child = ::fork();
  if (child < 0) throw std::runtime_error("no process");
  if (child == 0) become(command, folder, scratch, environment);
  int state = 0;
  if (::waitpid(child, &state, 0) != child) throw std::runtime_error("the process got lost");
  constexpr int by_signal = 128;
  return {WIFEXITED(state) ? WEXITSTATUS(state) : by_signal + WTERMSIG(state),
          read_whole(scratch + "/out"), read_whole(scratch + "/err")};
}

}  // namespace brink::testing

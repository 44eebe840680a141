// How the program ends.
#pragma once

#include "brink/base/error.hpp"

namespace brink::cli {

enum ExitStatus : int {
  kDone = 0,
  // The input or the site is wrong. Also what a defect of the program or a lack of memory ends
  // with: the message then says so.
  kInputWrong = 1,
  kCommandLineWrong = 2,
  kFileFailed = 3,  // a file, folder or standard output could not be read or written
};

constexpr ExitStatus exit_status(ErrorKind kind) {
  switch (kind) {
    case ErrorKind::input:
      return kInputWrong;
    case ErrorKind::argument:
      return kCommandLineWrong;
    case ErrorKind::file:
      return kFileFailed;
  }
  return kInputWrong;
}

}  // namespace brink::cli

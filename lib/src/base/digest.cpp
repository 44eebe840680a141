#include "brink/base/digest.hpp"

#include <fmt/format.h>
#include <nettle/sha2.h>

#include <array>
#include <cstdint>

namespace brink {

std::string sha256_hex(std::string_view bytes) {
  sha256_ctx state;
  sha256_init(&state);
  sha256_update(&state, bytes.size(), reinterpret_cast<const std::uint8_t*>(bytes.data()));
  std::array<std::uint8_t, SHA256_DIGEST_SIZE> digest{};
  sha256_digest(&state, digest.size(), digest.data());
  return fmt::format("{:02x}", fmt::join(digest, ""));
}

}  // namespace brink

// SPDX-License-Identifier: GPL-3.0-or-later
#include "plain_csv.h"

namespace rungwright
{

namespace
{

bool between(unsigned char c, unsigned char least, unsigned char greatest) { return c >= least && c <= greatest; }

// Length of the character at `at`, by the table of RFC 3629, section 4; 0 when it is not well-formed, or NUL.
std::size_t wellFormedLength(std::string_view bytes, std::size_t at)
{
    const auto byte = [&](std::size_t k) { return static_cast<unsigned char>(at + k < bytes.size() ? bytes[at + k] : '\0'); };
    const unsigned char first = byte(0);
    if (between(first, 0x01, 0x7F))
        return 1;
    if (between(first, 0xC2, 0xDF))
        return between(byte(1), 0x80, 0xBF) ? 2 : 0;
    if (between(first, 0xE0, 0xEF)) {
        const unsigned char least = first == 0xE0 ? 0xA0 : 0x80;
        const unsigned char greatest = first == 0xED ? 0x9F : 0xBF;
        return between(byte(1), least, greatest) && between(byte(2), 0x80, 0xBF) ? 3 : 0;
    }
    if (between(first, 0xF0, 0xF4)) {
        const unsigned char least = first == 0xF0 ? 0x90 : 0x80;
        const unsigned char greatest = first == 0xF4 ? 0x8F : 0xBF;
        return between(byte(1), least, greatest) && between(byte(2), 0x80, 0xBF) && between(byte(3), 0x80, 0xBF) ? 4 : 0;
    }
    return 0;
}

} // namespace

bool isPlainUtf8(std::string_view bytes)
{
    constexpr std::uint64_t ones = 0x0101010101010101U;
    constexpr std::uint64_t tops = 0x8080808080808080U;
    std::size_t at = 0;
    while (at < bytes.size()) {
        std::uint64_t word = 0;
        if (bytes.size() - at >= sizeof word) {
            std::memcpy(&word, bytes.data() + at, sizeof word);
            // Eight characters of ASCII, none of them NUL: no top bit, and none after one is taken off each.
            if (((word | (word - ones)) & tops) == 0) {
                at += sizeof word;
                continue;
            }
        }
        const std::size_t length = wellFormedLength(bytes, at);
        if (length == 0)
            return false;
        at += length;
    }
    return true;
}

} // namespace rungwright

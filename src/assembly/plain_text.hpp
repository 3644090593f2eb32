#pragma once

#include <lightledger/assembly/diagnostics.hpp>

#include <cstddef>
#include <string>
#include <string_view>

namespace lightledger::assembly {

/// One character of UTF-8 text; length 0 where the bytes form none.
struct Character {
  char32_t code = 0;
  std::size_t length = 0;
};

/// The character at the start of the text (RFC 3629: shortest form, no surrogates, up to U+10FFFF).
[[nodiscard]] Character first_character(std::string_view text);

/// Whether a character would move the cursor, hide itself or turn the direction of writing.
[[nodiscard]] bool steers_terminal(char32_t code);

/// Number of characters in well-formed UTF-8 text.
[[nodiscard]] std::size_t count_characters(std::string_view text);

/// Text made fit for a terminal: one blank for a tab, `?` for what is not a printable character, at most
/// `limit` characters, with an ellipsis where some were cut.
[[nodiscard]] std::string printable(std::string_view text, std::size_t limit);

/// A name or value of the user's in single quotes, printable and cut to a length that fits a sentence.
[[nodiscard]] std::string quoted(std::string_view text);
/// The same, so that std::quoted is not taken for strings.
[[nodiscard]] inline std::string quoted(const std::string& text) {
  return quoted(std::string_view(text));
}

/// Line and column (in bytes) of a place in the text.
[[nodiscard]] Mark mark_at(std::string_view text, std::size_t offset);

} // namespace lightledger::assembly

// Text from a user's file → text that is safe on a terminal. Control characters, and characters that change the direction of writing,
// become escapes one can read (`\u001b`), so that no file can move the cursor or colour the screen; everything else stays as it is.

const unsafe = /[\p{Cc}\u061c\u200e\u200f\u2028-\u202e\u2066-\u2069\ufeff]/gu

export function harmless(text: string): string {
  return text.replace(unsafe, (character) => `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`)
}

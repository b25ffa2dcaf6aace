const letterOrMark = /^[\p{L}\p{M}]$/u;
const unicodeDigit = /^\p{N}$/u;
const unicodeBlank = /^[\p{Zs}\u0085\u2028\u2029]$/u;

/** Tabs, spaces, any Unicode blank, and the byte order mark. */
export function isBlank(code: number): boolean {
  if (code < 0x80) return code === 32 || (9 <= code && code <= 13);
  return code === 0xa0 || code === 0xfeff || unicodeBlank.test(String.fromCharCode(code));
}

export function isDigit(code: number): boolean {
  return 48 <= code && code <= 57;
}

export function isLetter(code: number): boolean {
  if (code < 0x80) return (65 <= code && code <= 90) || (97 <= code && code <= 122);
  // Half of a pair is a letter of a script beyond the first plane, or an emoji, which ends a name all the same.
  return letterOrMark.test(String.fromCharCode(code));
}

/** What a name is made of: letters of any script, digits and hyphens. */
export function isNameCharacter(code: number): boolean {
  return (
    isLetter(code) ||
    isDigit(code) ||
    code === 45 ||
    (0x80 <= code && unicodeDigit.test(String.fromCharCode(code)))
  );
}

/** A character that shows nothing and changes what is read, so that it is told and never passed over. */
export function isInvisible(code: number): boolean {
  return (
    code === 0xad ||
    code === 0x34f ||
    code === 0x61c ||
    code === 0x180e ||
    (0x200b <= code && code <= 0x200f) ||
    (0x202a <= code && code <= 0x202e) ||
    (0x2060 <= code && code <= 0x206f) ||
    (code < 32 && !isBlank(code)) ||
    code === 127
  );
}

/** A character that no title or remark is written with: one that controls a terminal, or turns the direction of reading. */
export function isControl(code: number): boolean {
  return (
    (code < 32 && !isBlank(code)) ||
    (0x7f <= code && code <= 0x9f && code !== 0x85) ||
    (0x202a <= code && code <= 0x202e) ||
    (0x2066 <= code && code <= 0x2069)
  );
}

/** `-`, the minus sign and the en dash. */
export function isMinus(code: number): boolean {
  return code === 45 || code === 0x2212 || code === 0x2013;
}

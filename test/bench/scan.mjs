/** Looks at every character once and counts the lines that begin with a bar: the least that reading a text takes. */
export function scan(text) {
  let bars = 0;
  let begins = true;
  for (let at = 0; at < text.length; at++) {
    const character = text.charCodeAt(at);
    if (begins && character === 0x7c) bars++;
    begins = character === 0x0a;
  }
  return bars;
}

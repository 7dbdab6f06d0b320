export interface RawPart {
  kind: 'text' | 'bytes';
  text: string;
}

/** The bytes of a message as the server sends them. */
export function bytesOf(base64: string): Uint8Array {
  return Uint8Array.from(atob(base64), (letter) => letter.charCodeAt(0));
}

/**
 * A raw message as it can be read: valid UTF-8 as text, every byte that prints nothing (control characters except tab
 * and line feed, broken sequences) as two hexadecimal digits, a run of them together.
 */
export function rawParts(bytes: Uint8Array): RawPart[] {
  const parts: RawPart[] = [];
  for (let at = 0; at < bytes.length;) {
    const length = characterLength(bytes, at);
    const piece = bytes.subarray(at, at + Math.max(1, length));
    if (length > 0) append(parts, 'text', decoder.decode(piece));
    else append(parts, 'bytes', (piece[0] ?? 0).toString(16).padStart(2, '0'));
    at += piece.length;
  }
  return parts;
}

const decoder = new TextDecoder('utf-8', { fatal: true, ignoreBOM: true });
const TAB = 0x09;
const LINE_FEED = 0x0a;
const SPACE = 0x20;
const DELETE = 0x7f;

/** How many bytes the printable character here takes; 0 when what stands here does not print. */
function characterLength(bytes: Uint8Array, at: number): number {
  const first = bytes[at] ?? 0;
  if (first < 0x80)
    return (first >= SPACE && first !== DELETE) || first === TAB || first === LINE_FEED ? 1 : 0;
  // The lead byte says how many follow [RFC 3629 section 3].
  const length = first >= 0xf0 ? 4 : first >= 0xe0 ? 3 : first >= 0xc0 ? 2 : 0;
  if (length === 0 || at + length > bytes.length) return 0;
  try {
    const character = decoder.decode(bytes.subarray(at, at + length));
    return /^[\p{C}]$/u.test(character) ? 0 : length;
  } catch {
    return 0;
  }
}

function append(parts: RawPart[], kind: RawPart['kind'], text: string): void {
  const last = parts.at(-1);
  if (last?.kind === kind) last.text += kind === 'bytes' ? ` ${text}` : text;
  else parts.push({ kind, text });
}

const crockford = '0123456789ABCDEFGHJKMNPQRSTVWXYZ';

/** Boot id: the ten time characters of a ULID, so that later boots compare greater as text. */
export function bootIdAt(at: number): string {
  let rest = Math.floor(at);
  let text = '';
  for (let place = 0; place < 10; place += 1) {
    text = crockford.charAt(rest % 32) + text;
    rest = Math.floor(rest / 32);
  }
  return text;
}

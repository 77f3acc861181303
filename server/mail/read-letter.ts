/** Reads back a letter of our own making (RFC 5322, multipart/alternative): its subject and its plain text. */

interface Part {
  headers: Map<string, string>;
  body: string;
}

/** `raw` holds one byte a character. */
export function readLetter(raw: string): { subject: string; text: string } {
  const letter = splitPart(raw);
  return { subject: decodeWords(letter.headers.get('subject') ?? ''), text: plainText(letter) ?? '' };
}

function splitPart(raw: string): Part {
  const gap = /\r?\n\r?\n/.exec(raw);
  const head = gap ? raw.slice(0, gap.index) : raw;
  const unfolded = head.replace(/\r?\n[ \t]+/g, ' ').split(/\r?\n/);
  const headers = new Map<string, string>();
  for (const line of unfolded) {
    const colon = line.indexOf(':');
    if (colon > 0) headers.set(line.slice(0, colon).toLowerCase(), line.slice(colon + 1).trim());
  }
  return { headers, body: gap ? raw.slice(gap.index + gap[0].length) : '' };
}

function plainText(part: Part): string | null {
  const type = part.headers.get('content-type') ?? 'text/plain';
  const boundary = /boundary="?([^";]+)"?/i.exec(type)?.[1];
  if (boundary) {
    const inner = part.body.split(`--${boundary}`).slice(1).map((piece) => splitPart(piece.replace(/^\r?\n/, ''))); // prettier-ignore
    return inner.map(plainText).find((text) => text !== null) ?? null;
  }
  return /^text\/plain/i.test(type) ? decodeBody(part) : null;
}

function decodeBody({ headers, body }: Part): string {
  const encoding = headers.get('content-transfer-encoding')?.toLowerCase();
  const bytes = encoding === 'base64' ? Buffer.from(body, 'base64') : fromQuotedPrintable(body, encoding);
  return bytes.toString('utf8').replace(/\r\n/g, '\n').trimEnd();
}

function fromQuotedPrintable(body: string, encoding: string | undefined): Buffer {
  if (encoding !== 'quoted-printable') return Buffer.from(body, 'latin1');
  const joined = body.replace(/=\r?\n/g, '');
  const plain = joined.replace(/=([0-9A-F]{2})/gi, (_, hex: string) =>
    String.fromCharCode(parseInt(hex, 16)),
  );
  return Buffer.from(plain, 'latin1');
}

/** Encoded words of RFC 2047, Q and B. */
function decodeWords(text: string): string {
  const joined = text.replace(/\?=\s+=\?/g, '?==?');
  return joined.replace(/=\?utf-8\?([QB])\?([^?]*)\?=/gi, (_, kind: string, word: string) =>
    kind.toUpperCase() === 'B'
      ? Buffer.from(word, 'base64').toString('utf8')
      : fromQuotedPrintable(word.replace(/_/g, ' '), 'quoted-printable').toString('utf8'),
  );
}

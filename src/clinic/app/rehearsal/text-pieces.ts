/** A piece of a text: words, or a link that may be followed. */
export interface TextPiece {
  readonly says: string;
  readonly href: string | null;
}

const link = /https?:\/\/[^\s<>"]+/g;

/** Only links to this very place can be followed from the pretended phones. */
export function textPieces(body: string, origin: string): TextPiece[] {
  const pieces: TextPiece[] = [];
  let last = 0;
  for (const match of body.matchAll(link)) {
    const found = match[0].replace(/[.,;:!?)]+$/, '');
    if (match.index > last) pieces.push({ says: body.slice(last, match.index), href: null });
    pieces.push({ says: found, href: ownPath(found, origin) });
    last = match.index + found.length;
  }
  if (last < body.length) pieces.push({ says: body.slice(last), href: null });
  return pieces;
}

function ownPath(url: string, origin: string): string | null {
  if (!URL.canParse(url)) return null;
  const parsed = new URL(url);
  return parsed.origin === origin ? parsed.pathname + parsed.search : null;
}

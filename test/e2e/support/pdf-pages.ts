import { crc32, deflateSync } from 'node:zlib';
import { PDFiumLibrary } from '@hyzyla/pdfium';

export interface PdfPage {
  /** Dots of 1/144 inch, from white to black. */
  readonly picture: Buffer;
  readonly text: string;
  /** The box around everything printed, in millimetres from the left and the upper edge of the paper. */
  readonly ink: InkBox;
  /** The same for a part of the page. */
  readonly inkWithin: (fromMm: number, toMm: number) => InkBox;
}

export interface InkBox {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

const dotsPerInch = 144;
const mmPerDot = 25.4 / dotsPerInch;

interface Dots {
  readonly width: number;
  readonly height: number;
  readonly data: Uint8Array;
}

/** What a PDF looks like on paper, and the text that it gives to whoever copies it or has it read out. */
export async function pdfPages(pdf: Uint8Array): Promise<readonly PdfPage[]> {
  const library = await PDFiumLibrary.init();
  try {
    const file = await library.loadDocument(pdf);
    const pages: PdfPage[] = [];
    for (const page of file.pages()) {
      // Before the picture: the library closes a page when it has drawn it.
      const text = page.getText();
      const { width, height, data } = await page.render({
        scale: dotsPerInch / 72,
        colorSpace: 'Gray',
        render: 'bitmap',
      });
      const dots: Dots = { width, height, data: Uint8Array.from(data) };
      pages.push({
        picture: png(dots),
        text,
        ink: inkOf(dots, 0, height),
        inkWithin: (fromMm, toMm) =>
          inkOf(dots, Math.round(fromMm / mmPerDot), Math.round(toMm / mmPerDot)),
      });
    }
    file.destroy();
    return pages;
  } finally {
    library.destroy();
  }
}

function inkOf({ width, data }: Dots, fromRow: number, toRow: number): InkBox {
  let [left, right, top, bottom] = [Infinity, -Infinity, Infinity, -Infinity];
  for (let row = fromRow; row < toRow; row += 1)
    for (let column = 0; column < width; column += 1) {
      if ((data[row * width + column] ?? 255) > 200) continue;
      left = Math.min(left, column);
      right = Math.max(right, column + 1);
      top = Math.min(top, row);
      bottom = Math.max(bottom, row + 1);
    }
  return {
    left: left * mmPerDot,
    right: right * mmPerDot,
    top: top * mmPerDot,
    bottom: bottom * mmPerDot,
  };
}

/** Portable Network Graphics, second edition (W3C, 2003): 8 bits of grey, no filter. */
function png({ width, height, data }: Dots): Buffer {
  const header = Buffer.alloc(13);
  header.writeUInt32BE(width, 0);
  header.writeUInt32BE(height, 4);
  header.set([8, 0, 0, 0, 0], 8);
  const rows = Buffer.alloc((width + 1) * height);
  for (let row = 0; row < height; row += 1)
    rows.set(data.subarray(row * width, (row + 1) * width), row * (width + 1) + 1);
  return Buffer.concat([
    Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]),
    chunk('IHDR', header),
    chunk('IDAT', deflateSync(rows, { level: 9 })),
    chunk('IEND', Buffer.alloc(0)),
  ]);
}

function chunk(name: string, data: Buffer): Buffer {
  const named = Buffer.concat([Buffer.from(name, 'ascii'), data]);
  const [length, sum] = [Buffer.alloc(4), Buffer.alloc(4)];
  length.writeUInt32BE(data.length);
  sum.writeUInt32BE(crc32(named));
  return Buffer.concat([length, named, sum]);
}

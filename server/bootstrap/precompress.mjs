import { readFile, readdir, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { brotliCompress, constants, gzip } from 'node:zlib';

const brotli = promisify(brotliCompress);
const zip = promisify(gzip);
const isText = /\.(js|css|html|json|svg|txt|webmanifest|map)$/;
const together = 4;

/** Puts a .br and a .gz beside every text file of a folder, at the best ratio. */
export async function precompress(folder) {
  const entries = await readdir(folder, { withFileTypes: true, recursive: true });
  const files = entries
    .filter((entry) => entry.isFile() && isText.test(entry.name))
    .map((entry) => join(entry.parentPath ?? entry.path, entry.name));
  const waiting = [...files];
  const work = async () => {
    for (let file = waiting.pop(); file; file = waiting.pop()) await compress(file);
  };
  await Promise.all(Array.from({ length: together }, work));
  return files.length;
}

async function compress(file) {
  const content = await readFile(file);
  const options = {
    params: {
      [constants.BROTLI_PARAM_QUALITY]: constants.BROTLI_MAX_QUALITY,
      [constants.BROTLI_PARAM_SIZE_HINT]: content.length,
      [constants.BROTLI_PARAM_MODE]: constants.BROTLI_MODE_TEXT,
    },
  };
  await writeFile(`${file}.br`, await brotli(content, options));
  await writeFile(`${file}.gz`, await zip(content, { level: 9 }));
}

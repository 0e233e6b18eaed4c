import type { View } from './views';

export interface Picture {
  readonly screen: string;
  readonly view: View;
  /** Beside the sheet. */
  readonly path: string;
}

/** How wide a picture stands on the sheet, by the width of the window it was taken in. */
const shown: Record<number, number> = {
  320: 210,
  390: 250,
  710: 420,
  768: 330,
  973: 520,
  1280: 460,
  1920: 560,
};

/** A page with one row a screen; each picture leads to itself in full size. */
export function contactSheet(title: string, pictures: readonly Picture[]): string {
  const screens = [...new Set(pictures.map(({ screen }) => screen))];
  const rows = screens.map((name) =>
    row(
      name,
      pictures.filter(({ screen }) => screen === name),
    ),
  );
  return `<!doctype html><html lang="en"><meta charset="utf-8"><title>${title}</title><style>
body{font:14px system-ui,sans-serif;margin:12px;background:#777;color:#fff}
h2{font-size:16px;margin:16px 0 4px}div{display:flex;gap:12px;align-items:start}
figure{margin:0}a{display:block;max-height:900px;overflow:hidden;border:1px solid #000}
img{display:block;width:100%}figcaption{font-size:12px}
</style><h1>${title}</h1>${rows.join('')}</html>`;
}

function row(screen: string, shots: readonly Picture[]): string {
  const figures = shots.map(
    ({ path, view }) =>
      `<figure style="width:${shown[view.width] ?? 300}px"><a href="${path}"><img src="${path}" alt=""></a><figcaption>${view.width} ${view.language} ${view.scheme}</figcaption></figure>`,
  );
  return `<h2>${screen}</h2><div>${figures.join('')}</div>`;
}

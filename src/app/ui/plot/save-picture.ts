import type { Data, Layout } from 'plotly.js-dist-min';
import { saveFile } from '../save-file/save-file';
import { ChartTheme } from './chart-theme';
import { Plotly } from './plotly-loader';

export interface Picture {
  readonly theme: ChartTheme;
  readonly data: Data[];
  readonly layout: Partial<Layout>;
}

/** Ground left around the saved picture, px. */
const RIM = 16;
/** Pixels of the picture for one of the page. */
const SHARPNESS = 2;

/** Saves a chart as PNG on the page's ground, in the page's own typeface. */
export async function savePicture(
  plotly: Plotly,
  { theme, data, layout }: Picture,
  name: string,
  page: Document,
): Promise<void> {
  const { l = 0, r = 0, t = 0, b = 0 } = layout.margin ?? {};
  const width = (layout.width ?? 0) + 2 * RIM;
  const height = (layout.height ?? 0) + 2 * RIM;
  const margin = { l: l + RIM, r: r + RIM, t: t + RIM, b: b + RIM };
  const figure = { data, layout: { ...layout, width, height, margin, paper_bgcolor: theme.plate } };
  const address = await plotly.toImage(figure, { format: 'svg', width, height });
  const svg = decodeURIComponent(address.slice(address.indexOf(',') + 1));
  const whole = withStyle(svg, await fontFaces(page, theme.font));
  saveFile(page, `${name}.png`, await asPng(page, whole, width, height));
}

/** Puts a style sheet into an SVG: a picture does not see those of the page. */
export function withStyle(svg: string, css: string): string {
  return svg.replace(/<svg\b[^>]*>/, (tag) => `${tag}<style>${css}</style>`);
}

/** The page's rules for the first family of `font`, their files inside. */
async function fontFaces(page: Document, font: string): Promise<string> {
  const family = font.split(',')[0].replace(/["']/g, '').trim();
  const rules = [...page.styleSheets].flatMap((sheet) =>
    [...sheet.cssRules]
      .filter((rule) => rule instanceof CSSFontFaceRule)
      .filter(({ style }) => style.getPropertyValue('font-family').includes(family))
      .map((rule) => ({ style: rule.style, base: sheet.href ?? page.baseURI })),
  );
  const faces = await Promise.all(
    rules.map(async ({ style, base }) => {
      const file = /url\(["']?([^"')]+\.woff2)["']?\)/.exec(style.getPropertyValue('src'))?.[1];
      if (!file) return '';
      const source = await asDataAddress(await (await fetch(new URL(file, base))).blob());
      return `@font-face{font-family:"${family}";font-weight:${style.getPropertyValue('font-weight')};src:url(${source})}`;
    }),
  );
  return faces.join('');
}

function asDataAddress(blob: Blob): Promise<string> {
  return new Promise((resolve, reject) => {
    const reader = new FileReader();
    reader.onload = () => resolve(reader.result as string);
    reader.onerror = () => reject(reader.error ?? new Error('The typeface could not be read.'));
    reader.readAsDataURL(blob);
  });
}

async function asPng(page: Document, svg: string, width: number, height: number): Promise<Blob> {
  const picture = new Image();
  picture.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svg)}`;
  await picture.decode();
  const canvas = page.createElement('canvas');
  canvas.width = width * SHARPNESS;
  canvas.height = height * SHARPNESS;
  canvas.getContext('2d')?.drawImage(picture, 0, 0, canvas.width, canvas.height);
  return new Promise((resolve, reject) =>
    canvas.toBlob((blob) => (blob ? resolve(blob) : reject(new Error('The picture could not be made.')))),
  );
}

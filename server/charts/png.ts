import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import { renderAsync } from '@resvg/resvg-js';

const require = createRequire(import.meta.url);
const fontFolder = join(dirname(require.resolve('dejavu-fonts-ttf/package.json')), 'ttf');
const font = {
  loadSystemFonts: false,
  fontFiles: ['DejaVuSans.ttf', 'DejaVuSans-Bold.ttf'].map((name) => join(fontFolder, name)),
  defaultFontFamily: 'DejaVu Sans',
};

/** A chart as PNG, drawn in a thread of its own with fonts that come with the service. */
export async function pngOf(svg: string): Promise<Uint8Array> {
  const image = await renderAsync(svg, { font });
  return image.asPng();
}

import type { ChartSpec } from './chartSpec.js';
import { finishSvg } from './finishSvg.js';
import { fontFiles, textWidthReader } from './fonts.js';

/**
 * Draws a chart as SVG text with `<title>` and `<desc>`; equal charts give equal bytes.
 * @throws Error when the specification gives a warning: a chart that is half understood is not drawn
 */
export async function renderSvg(chart: ChartSpec): Promise<string> {
  const { vega, vegaLite } = await drawingLibraries();
  const logger = throwingLogger();
  const spec = chart.vegaLite as unknown as Parameters<typeof vegaLite.compile>[0];
  const compiled = vegaLite.compile(spec, { logger });
  const view = new vega.View(vega.parse(compiled.spec), { renderer: 'none', logger });
  try {
    vega.resetSVGDefIds();
    const svg = await view.toSVG();
    return finishSvg(svg, chart.title, chart.description);
  } finally {
    view.finalize();
  }
}

/**
 * Draws a chart as PNG with the fonts that come with the package: the same picture on every machine.
 * @param scale pixels per unit of the drawing; 2 is sharp on screens and in print
 */
export async function renderPng(chart: ChartSpec, scale = 2): Promise<Buffer> {
  const svg = await renderSvg(chart);
  const { Resvg } = await import('@resvg/resvg-js');
  const { regular, bold } = fontFiles();
  const image = new Resvg(svg, {
    background: 'white',
    fitTo: { mode: 'zoom', value: scale },
    font: {
      loadSystemFonts: false,
      fontFiles: [regular, bold],
      defaultFontFamily: 'DejaVu Sans',
      sansSerifFamily: 'DejaVu Sans',
    },
  });
  return image.render().asPng();
}

type Vega = typeof import('vega');
type VegaLite = typeof import('vega-lite');

let loaded: Promise<{ readonly vega: Vega; readonly vegaLite: VegaLite }> | null = null;

/**
 * Loads both libraries on first use. A static import would keep the whole package from being loaded by `require`,
 * which notebooks do, since vega waits for something at its top level.
 */
function drawingLibraries(): Promise<{ readonly vega: Vega; readonly vegaLite: VegaLite }> {
  loaded ??= (async () => {
    const [vega, vegaLite] = await Promise.all([import('vega'), import('vega-lite')]);
    measureWithOurFonts(vega);
    return { vega, vegaLite };
  })();
  return loaded;
}

/** Without a canvas vega guesses 0.8 em a character: too wide by half, and labels are cut short for it. */
function measureWithOurFonts(vega: Vega): void {
  const width = textWidthReader();
  const metrics = (vega as unknown as { readonly textMetrics: TextMetrics }).textMetrics;
  metrics.width = (item, text) => {
    const weight = item.fontWeight;
    const bold = weight === 'bold' || Number(weight) >= 600;
    return width(String(text ?? '').trim(), item.fontSize ?? 11, bold);
  };
}

interface TextMetrics {
  width: (
    item: { readonly fontSize?: number; readonly fontWeight?: string | number },
    text: string | null | undefined,
  ) => number;
}

/** A logger in vega's sense that stops at the first warning and keeps quiet otherwise. */
function throwingLogger() {
  const fail = (...parts: readonly unknown[]): never => {
    throw new Error(`The chart cannot be drawn as specified: ${parts.map(String).join(' ')}`);
  };
  const logger = {
    level: (level?: number) => (level === undefined ? 2 : logger),
    error: fail,
    warn: fail,
    info: () => logger,
    debug: () => logger,
  };
  return logger as typeof logger & { level(): number; level(level: number): typeof logger };
}

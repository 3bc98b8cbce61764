import { chartColours } from './chartColours.ts';

const MARGIN_PX = 16;
const TITLE_HEIGHT_PX = 56;
const FOOT_HEIGHT_PX = 28;

/** Hands a text to the person as a file. */
export function saveText(text: string, fileName: string, mediaType: string): void {
  saveBlob(new Blob([text], { type: mediaType }), fileName);
}

/** Hands a drawn chart to the person as a PNG: on the sheet colour, with its title and the names of its axes. */
export function saveChartPicture(
  canvas: HTMLCanvasElement,
  options: { readonly fileName: string; readonly title: string; readonly yLabel: string; readonly xLabel: string },
): void {
  const scale = devicePixelRatio;
  const picture = document.createElement('canvas');
  picture.width = canvas.width + 2 * MARGIN_PX * scale;
  picture.height = canvas.height + (2 * MARGIN_PX + TITLE_HEIGHT_PX + FOOT_HEIGHT_PX) * scale;
  const context = picture.getContext('2d');
  if (context === null) return;
  const colours = chartColours(canvas.parentElement ?? document.body);
  context.fillStyle = colours.sheet;
  context.fillRect(0, 0, picture.width, picture.height);
  context.drawImage(canvas, MARGIN_PX * scale, (MARGIN_PX + TITLE_HEIGHT_PX) * scale);
  context.scale(scale, scale);
  context.textBaseline = 'top';
  const write = (text: string, x: number, y: number, sizePx: number) => {
    context.font = `${String(sizePx)}px "Atkinson Hyperlegible", sans-serif`;
    context.fillText(text, x, y);
  };
  context.fillStyle = colours.ink;
  write(options.title, MARGIN_PX, MARGIN_PX, 18);
  context.fillStyle = colours.muted;
  write(options.yLabel, MARGIN_PX, MARGIN_PX + 32, 14);
  context.textAlign = 'right';
  write(options.xLabel, picture.width / scale - MARGIN_PX, picture.height / scale - MARGIN_PX - 16, 14);
  picture.toBlob((blob) => {
    if (blob !== null) saveBlob(blob, options.fileName);
  });
}

function saveBlob(blob: Blob, fileName: string): void {
  const address = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = address;
  link.download = fileName;
  link.click();
  URL.revokeObjectURL(address);
}

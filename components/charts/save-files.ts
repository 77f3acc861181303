/** Saved charts as files: their names, the picture's pixels, and the way to the person's disk. */
import type { Origin } from '@/shared/charts/figure/sheet';

/** "harbour-survey_position-innovation_run-4f0c8a52.svg" */
export function fileName(origin: Origin, chart: string, part: string, ending: 'svg' | 'png' | 'csv'): string {
  const run = origin.run === null ? '' : `run-${origin.run.slice(0, 8)}`;
  const stem = [origin.recording, chart, run, part].map(slug).filter(Boolean).join('_');
  return `${stem || 'chart'}.${ending}`;
}

const slug = (text: string) =>
  text
    .normalize('NFKD')
    .replaceAll('σ', 'sigma')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 60);

/** An SVG document as PNG, `scale` pixels to each of its own. Rejects where the browser cannot draw it. */
export async function pngOf(svg: string, width: number, height: number, scale = 2): Promise<Blob> {
  const image = new Image(width, height);
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svg)}`;
  await image.decode();
  const canvas = document.createElement('canvas');
  canvas.width = Math.round(width * scale);
  canvas.height = Math.round(height * scale);
  const context = canvas.getContext('2d');
  if (!context) throw new Error('This browser gives no canvas to draw on: save the chart as SVG.');
  context.drawImage(image, 0, 0, canvas.width, canvas.height);
  return new Promise((resolve, reject) =>
    canvas.toBlob(
      (blob) => (blob ? resolve(blob) : reject(new Error('The picture could not be made: save it as SVG.'))),
      'image/png',
    ),
  );
}

/** Hands `blob` to the browser's downloads. */
export function download(blob: Blob, name: string): void {
  const url = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  document.body.append(link);
  link.click();
  link.remove();
  // The browser has taken hold of the file by the next task.
  setTimeout(() => URL.revokeObjectURL(url), 0);
}

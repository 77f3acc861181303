/** What a PDF says, by Debian's poppler-utils, installed where they are missing. */
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { aptInstall } from '../../scripts/lib/apt';
import { run } from '../../scripts/lib/shell';

/** Throws with what to do by hand where they can be neither found nor installed. */
export function needPoppler(): void {
  if (!run('pdftotext', ['-v']).ok) aptInstall('poppler-utils', '', console.log);
}

export interface PdfText {
  /** Page by page, as laid out. */
  pages: string[];
  /** All on one line, runs of blanks as one. */
  text: string;
}

export function pdfText(pdf: Uint8Array): PdfText {
  const folder = mkdtempSync(path.join(tmpdir(), 'driftwright-pdf-'));
  try {
    const file = path.join(folder, 'report.pdf');
    writeFileSync(file, pdf);
    const found = run('pdftotext', ['-layout', '-enc', 'UTF-8', file, '-']);
    if (!found.ok) throw new Error(found.stderr);
    const pages = found.stdout.split('\f').filter((page) => page.trim() !== '');
    return { pages, text: found.stdout.replace(/\s+/g, ' ') };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

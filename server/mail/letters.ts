/** The letters' words, as plain text and as HTML. */
import { ROLE_SUMMARY, type Role } from '@/shared/contracts/roles';

export interface Letter {
  to: string;
  subject: string;
  text: string;
  html: string;
}

interface Content {
  to: string;
  subject: string;
  lines: string[];
  link: { label: string; url: string };
  closing: string;
}

export const invitationLetter = (
  to: string,
  by: string,
  workspace: string,
  role: Role,
  url: string,
): Letter =>
  compose({
    to,
    subject: `${by} invites you to ${workspace}`,
    lines: [
      `${by} invites you to the workspace “${workspace}” in Driftwright as ${role}.`,
      `What the role does: ${ROLE_SUMMARY[role]}`,
    ],
    link: { label: 'Accept the invitation', url },
    closing: 'The link works once, for seven days. If you did not expect it, do nothing.',
  });

export const resetLetter = (to: string, name: string, url: string): Letter =>
  compose({
    to,
    subject: 'Set a new password',
    lines: [`${name}, somebody asked to set a new Driftwright password for this address.`],
    link: { label: 'Set a new password', url },
    closing:
      'The link works once, for one hour. If it was not you, do nothing: your password stays as it is.',
  });

/** A letter in both forms; a line break within a line stays one. */
export function compose({ to, subject, lines, link, closing }: Content): Letter {
  const text = [...lines, `${link.label}: ${link.url}`, closing].join('\n\n');
  const paragraph = (words: string) => `<p>${escapeHtml(words).replace(/\r?\n/g, '<br>')}</p>`;
  const anchor = `<p><a href="${escapeHtml(link.url)}">${escapeHtml(link.label)}</a></p>`;
  const body = [...lines.map(paragraph), anchor, paragraph(closing)].join('\n');
  const html = `<!doctype html><html lang="en"><body style="font-family: sans-serif">\n${body}\n</body></html>`;
  return { to, subject, text, html };
}

const ESCAPES: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};
const escapeHtml = (text: string) => text.replace(/[&<>"']/g, (sign) => ESCAPES[sign] ?? sign);

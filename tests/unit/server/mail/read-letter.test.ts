import nodemailer from 'nodemailer';
import { invitationLetter, type Letter, resetLetter } from '@/server/mail/letters';
import { readLetter } from '@/server/mail/read-letter';

/** The letter as nodemailer puts it on the wire. */
async function onTheWire(letter: Letter): Promise<string> {
  const transport = nodemailer.createTransport({ streamTransport: true, buffer: true, newline: 'windows' });
  const { message } = await transport.sendMail({ ...letter, from: 'Driftwright <driftwright@localhost>' });
  return (message as Buffer).toString('latin1');
}

describe('reading a letter of the local sink back', () => {
  it.each([
    ['plain', 'Ada Brink', 'Harbour crew'],
    ['not in ASCII', 'Ása Løvås-Ærø', 'Küstenvermessung „Nord“ 港'],
    [
      'longer than a line',
      'A person with a name so long that it is folded over several lines of the header',
      'x'.repeat(300),
    ],
  ])('gives subject and text as they were written: %s', async (_what, by, workspace) => {
    const link = `https://drift.example/invitation?token=${'a1_-'.repeat(12)}`;
    const letter = invitationLetter('mira@kelmar.example', by, workspace, 'approver', link);
    const read = readLetter(await onTheWire(letter));
    expect(read.subject).toBe(letter.subject);
    expect(read.text).toBe(letter.text);
    expect(read.text).toContain(link);
  });

  it('escapes names in the HTML part', () => {
    const { html } = resetLetter(
      'a@b.example',
      '<b>"A" & B</b>',
      'https://drift.example/reset-password?token=x',
    );
    expect(html).toContain('&lt;b&gt;&quot;A&quot; &amp; B&lt;/b&gt;');
    expect(html).not.toContain('<b>');
  });

  it('reads a letter without parts, too', () => {
    const raw =
      'Subject: =?utf-8?B?R3LDvMOfZQ==?=\r\nContent-Transfer-Encoding: quoted-printable\r\n\r\nGr=C3=BC=\r\n=C3=9Fe';
    expect(readLetter(raw)).toEqual({ subject: 'Grüße', text: 'Grüße' });
  });
});

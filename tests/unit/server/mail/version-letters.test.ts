import {
  type FailingCell,
  type NamedVersion,
  releasedLetter,
  returnedLetter,
  reviewAskedLetter,
  verificationFailedLetter,
} from '@/server/mail/version-letters';

const TO = 'mira@kelmar.example';
const version: NamedVersion = {
  set: 'Harbour & <quay>',
  number: 3,
  vehicle: 'Crawler 1',
  workspace: 'Harbour survey',
  url: 'https://drift.example/sets/7f?version=3',
};
const phrase =
  'version 3 of “Harbour & <quay>” for the vehicle “Crawler 1”, in the workspace “Harbour survey”';
const cell = (at: number, fields: Partial<FailingCell> = {}): FailingCell => ({
  requirement: `Drift ${at}`,
  recording: 'Breakwater',
  runFailed: false,
  reason: null,
  ...fields,
});

describe('letters about a version', () => {
  it('ask for a review', () => {
    const letter = reviewAskedLetter(TO, 'Ada Brink', version, 'Trusts GNSS less.');
    expect(letter.to).toBe(TO);
    expect(letter.subject).toBe('Review asked: “Harbour & <quay>”, version 3');
    expect(letter.text).toBe(
      [
        `Ada Brink asks for a review of ${phrase}.`,
        'The note of the version:\nTrusts GNSS less.',
        'Open the version: https://drift.example/sets/7f?version=3',
        'You get this letter because you may review versions in this workspace. Which letters you get is chosen under Profile in Driftwright.',
      ].join('\n\n'),
    );
  });

  it('bring the comment of a return, line by line, and say how to go on', () => {
    const { text, html } = returnedLetter(
      TO,
      'Ole Tarn',
      version,
      'Too large:\n1. drift <after> 60 s\n2. NIS',
    );
    expect(text).toContain(`Ole Tarn returned ${phrase}.`);
    expect(text).toContain('The comment:\nToo large:\n1. drift <after> 60 s\n2. NIS');
    expect(text).toContain('To mend it, make a new draft from it.');
    expect(html).toContain('The comment:<br>Too large:<br>1. drift &lt;after&gt; 60 s<br>2. NIS');
    expect(html).toContain('<a href="https://drift.example/sets/7f?version=3">Open the version</a>');
    expect(html).not.toContain('<quay>');
  });

  it.each([
    [true, 'Quay, version 1', 'because you wrote or submitted the version'],
    [false, null, 'because you asked for one at every release in this workspace'],
  ])('tell of a release (own: %s)', (own, superseded, why) => {
    const { text } = releasedLetter(TO, 'Ole Tarn', version, { comment: '', superseded, own });
    expect(text).toContain(`Ole Tarn released ${phrase}.`);
    expect(text.includes('It takes the place of Quay, version 1.')).toBe(superseded !== null);
    expect(text).not.toContain('The comment');
    expect(text).toContain(why);
  });

  it('name the cells that failed, and why', () => {
    const cells = [cell(1), cell(2, { runFailed: true, reason: 'The recording is not decoded.' })];
    const { subject, text } = verificationFailedLetter(
      TO,
      'Ada Brink',
      { ...version, vehicle: null },
      cells,
      8,
    );
    expect(subject).toBe('Verification failed: “Harbour & <quay>”, version 3');
    expect(text).toContain(
      'Ada Brink, the verification that you started of version 3 of “Harbour & <quay>” for no vehicle yet, in the workspace “Harbour survey” has ended: 2 of 8 cells failed.',
    );
    expect(text).toContain(
      '– “Drift 1” on “Breakwater”: fails\n– “Drift 2” on “Breakwater”: its run failed (The recording is not decoded)\n\n',
    );
  });

  it('name ten cells and count the rest', () => {
    const cells = Array.from({ length: 13 }, (_, at) => cell(at + 1));
    const { text } = verificationFailedLetter(TO, 'Ada Brink', version, cells, 13);
    expect(text).toContain('“Drift 10” on “Breakwater”: fails\nand 3 more\n\n');
    expect(text).not.toContain('Drift 11');
  });
});

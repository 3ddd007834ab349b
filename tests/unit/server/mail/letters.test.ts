import { describe, expect, it } from 'vitest';
import { invitationMail } from '@/lib/server/mail/invitation';
import { renderLetter } from '@/lib/server/mail/letter';
import { measurementsWaitingMail } from '@/lib/server/mail/measurements-waiting';
import { nightCalibratedMail } from '@/lib/server/mail/night-calibrated';
import { nightNotPhotometricMail } from '@/lib/server/mail/night-not-photometric';
import { oneLine } from '@/lib/server/mail/one-line';
import { senderDomain } from '@/lib/server/mail/post-mail';
import { uploadRefusedMail } from '@/lib/server/mail/upload-refused';

const refused = {
  name: 'Noor Hathaway',
  night: '3 November 2026, Larkspur 0.8 m',
  fileName: 'n1103.csv',
  nFaults: 1234,
  faults: Array.from({ length: 9 }, (_, n) => ({
    path: 'inst_mag',
    line: n + 2,
    column: 'INST_MAG',
    value: `bad${n}`,
    message: 'is not a number',
    remedy: 'Write it with a point.',
  })),
  href: 'http://127.0.0.1:3000/measurement-sets/3kq8v7m2t0xc',
};

describe('the letter about a refused upload', () => {
  it.each(['text', 'html'] as const)(
    'tells night, file, number of faults and the first five in its %s',
    (form) => {
      const letter = uploadRefusedMail(refused)[form];
      for (const part of [
        'Noor Hathaway',
        refused.night,
        'n1103.csv',
        '1,234 faults',
        refused.href,
        'INST_MAG',
        'bad0',
        'bad4',
      ])
        expect(letter).toContain(part);
      expect(letter).not.toContain('bad5');
    },
  );

  it('gives line, column, value and reason of each fault', () => {
    expect(uploadRefusedMail(refused).text).toContain(
      '- Line 2; Column INST_MAG; Value bad0; Fault is not a number. Write it with a point.',
    );
  });

  it('counts a single fault in the singular', () => {
    const { subject, text } = uploadRefusedMail({
      ...refused,
      nFaults: 1,
      faults: refused.faults.slice(0, 1),
    });
    expect(subject).toBe('Refused: n1103.csv (1 fault)');
    expect(text).toContain('One fault was found');
  });
});

describe('the letter about measurements waiting', () => {
  it.each(['text', 'html'] as const)('tells night, set, rows and matches in its %s', (form) => {
    const letter = measurementsWaitingMail({
      name: 'Bram Oyelaran',
      night: refused.night,
      set: 'standards before midnight',
      uploadedBy: 'Noor Hathaway',
      nRows: 1_000_000,
      nMatched: 321,
      href: refused.href,
    })[form];
    for (const part of [
      refused.night,
      'standards before midnight',
      'Noor Hathaway',
      '1,000,000',
      '321',
      refused.href,
    ])
      expect(letter).toContain(part);
  });
});

describe('the letter with a one-time link', () => {
  it.each(['text', 'html'] as const)('carries the link in its %s', (form) => {
    const link = 'http://127.0.0.1:3000/welcome/abcdef';
    const letter = invitationMail({
      observatory: 'Marrow Hill Observatory',
      name: 'Wren Achterberg',
      link,
      isReset: false,
    });
    expect(letter[form]).toContain(link);
  });
});

describe('any letter', () => {
  it('has a subject of one line, whatever a file is called', () => {
    const { subject } = uploadRefusedMail({
      ...refused,
      fileName: 'a\r\nBcc: everybody@evenfall.example\u2028\u0000.csv',
    });
    expect(subject).not.toMatch(/[\p{Cc}\u2028\u2029]/u);
    expect(subject).toContain('a Bcc: everybody@evenfall.example .csv');
  });

  it('shows markup in names, values and remedies as text, in HTML', () => {
    const attack = '<img src=x onerror="alert(1)">&amp;\'';
    const { html } = uploadRefusedMail({
      ...refused,
      name: attack,
      night: attack,
      fileName: attack,
      faults: [{ path: attack, column: attack, value: attack, message: attack, remedy: attack }],
    });
    expect(html).not.toContain('<img');
    expect(html).toContain('&lt;img src=x onerror=&quot;alert(1)&quot;&gt;&amp;amp;&#39;');
  });

  it('does not let direction marks or control characters change how it reads', () => {
    const { html, text } = uploadRefusedMail({
      ...refused,
      faults: [{ path: '', value: 'a\u202Eb\u0007c', message: 'm' }],
    });
    expect(html + text).not.toMatch(/[\u202E\u0007]/);
  });

  it('refuses to link to anything but a web address', () => {
    const href = 'javascript:alert(1)';
    expect(() =>
      renderLetter({ subject: 's', name: 'n', parts: [{ kind: 'link', label: 'l', href }] }),
    ).toThrow(/javascript:/);
  });

  it('keeps the lines of its plain text within 76 characters', () => {
    const text = 'word '.repeat(60).trim();
    const letter = renderLetter({ subject: 's', name: 'n', parts: [{ kind: 'text', text }] });
    expect(Math.max(...letter.text.split('\n').map((line) => line.length))).toBeLessThanOrEqual(76);
  });
});

describe('the letter about a calibrated night', () => {
  it('gives coefficients to the digits that their errors support, and says which were held', () => {
    const term = { error: 0.00995, status: 'free' as const };
    const { text } = nightCalibratedMail({
      name: 'Tomas Verrall',
      night: '17 October 2026, Larkspur 0.8 m',
      programme: 'MH26B-04',
      verdict: 'photometric',
      solution: 1,
      bands: [
        {
          band: 'V',
          coefficients: [
            { ...term, name: 'zero_point', value: 2.45928, error: 0.00515 },
            { ...term, name: 'colour_term', value: -0.06127 },
            { name: 'second_order_extinction', value: 0, error: 0, status: 'fixed' },
          ],
          scatterObservation: 0.0062,
          scatterFrame: 0.0045,
          nUsed: 409,
        },
      ],
      nStars: 728,
      nMeasurements: 6164,
      nLeftOut: 0,
      isAgain: false,
      href: 'http://127.0.0.1:3000/nights/3kq8v7m2t0xc/results',
    });
    expect(text).toContain('Coefficient Zero point; Value 2.4593 ± 0.0052; Unit');
    expect(text).toContain('Coefficient Colour term; Value −0.061 ± 0.010; Unit');
    expect(text).toContain('Coefficient Second-order extinction; Value 0, held fixed; Unit');
  });
});

describe('the letter about a night that is not photometric', () => {
  const night = {
    name: 'Tomas Verrall',
    night: '17 October 2026, Larkspur 0.8 m',
    programmes: ['MH26B-04', 'MH26B-11'],
    solution: 2,
    proposedBy: 'Bram Oyelaran',
    proposal: 'Cirrus from 23 h <until dawn>.',
    approvedBy: 'Edda Lindqvist',
    comment: '',
    evidence: ['Scatter 0.080 mag in B: above 0.05.', 'No band could be determined.'],
    hasEarlier: false,
    href: 'http://127.0.0.1:3000/solutions/3kq8v7m2t0xc',
    measurements: 'http://127.0.0.1:3000/nights/4kq8v7m2t0xc/measurements',
  };

  it('says who judged, why, and where to look, and leaves out what nobody said', () => {
    const { subject, text } = nightNotPhotometricMail(night);
    expect(subject).toBe('Not photometric: 17 October 2026, Larkspur 0.8 m');
    for (const part of [
      'MH26B-04, MH26B-11',
      'Bram Oyelaran',
      'Edda Lindqvist',
      'Scatter 0.080 mag in B: above 0.05. No band could be determined.',
      night.href,
      night.measurements,
    ])
      expect(text).toContain(part);
    expect(text).toContain('Bram Oyelaran: “Cirrus from 23 h <until dawn>.”\n');
    expect(text).toContain('Edda Lindqvist\n');
    expect(nightNotPhotometricMail(night).html).toContain('23 h &lt;until dawn&gt;');
  });

  it('names one person to ask where one proposed and approved', () => {
    const { text } = nightNotPhotometricMail({ ...night, proposedBy: night.approvedBy });
    expect(text.replaceAll('\n', ' ')).toContain('ask Edda Lindqvist: the night can');
  });
});

describe('a header line', () => {
  it('is cut with an ellipsis at its limit', () => {
    expect(oneLine('abcdefgh', 5)).toBe('abcd…');
  });
});

describe('the domain of message ids', () => {
  it.each([
    ['Evenfall <evenfall@Marrow-Hill.example>', 'marrow-hill.example'],
    ['evenfall@localhost', 'localhost'],
  ])('of %s is %s', (from, domain) => {
    expect(senderDomain(from)).toBe(domain);
  });

  it('is not guessed from something that is no address', () => {
    expect(() => senderDomain('Evenfall')).toThrow(/MAIL_FROM/);
  });
});

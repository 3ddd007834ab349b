import 'server-only';
import { durationWords } from '@/lib/contracts/duration-words';
import { linkLife_hours } from '@/lib/contracts/people';
import { renderLetter, type RenderedLetter } from './letter';

interface Invitation {
  readonly observatory: string;
  readonly name: string;
  readonly link: string;
  /** Whether the person has had a password before. */
  readonly isReset: boolean;
}

/** The mail that brings a one-time link. */
export function invitationMail({ observatory, name, link, isReset }: Invitation): RenderedLetter {
  const what = isReset
    ? `A manager of ${observatory} made you a link by which you set a new password for Evenfall. Until you use it, the old one holds.`
    : `You are invited to Evenfall, the night log and calibration service of ${observatory}. By this link you set your password and sign in.`;
  const until = `The link works once and for ${durationWords(linkLife_hours * 3600)}. If you did not expect it, leave it alone and tell the observatory.`;
  return renderLetter({
    subject: isReset ? `Evenfall: set a new password` : `Evenfall: your account at ${observatory}`,
    name,
    parts: [
      { kind: 'text', text: what },
      { kind: 'link', label: 'Set your password', href: link },
      { kind: 'text', text: until },
    ],
  });
}

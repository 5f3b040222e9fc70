import type { Role } from '@/lib/contracts/lab';

const roleWords: Record<Role, string> = {
  lead: 'a lead: everything, with the lab’s members and record',
  analyst: 'an analyst: bring sessions in, run readouts, read everything',
  experimenter: 'an experimenter: bring sessions in, read everything',
  observer: 'an observer: read everything',
};

/** The mail that brings an invitation's link. Pure. */
export function invitationMail(facts: {
  labName: string;
  inviterName: string;
  role: Role;
  link: string;
  expiresAt: Date;
}): { subject: string; text: string } {
  return {
    subject: `Invitation to ${facts.labName} on Outfold`,
    text: [
      `${facts.inviterName} invites you to ${facts.labName} on Outfold as ${roleWords[facts.role]}.`,
      '',
      'To accept, open this link:',
      facts.link,
      '',
      `It works once, until ${facts.expiresAt.toISOString().slice(0, 16).replace('T', ' ')} UTC. If you did not expect this, do nothing: no account is made without you.`,
      '',
    ].join('\n'),
  };
}

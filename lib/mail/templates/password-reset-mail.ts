/** The mail that brings the link to set a new password. Pure. */
export function passwordResetMail(facts: { name: string; link: string; expiresAt: Date }): {
  subject: string;
  text: string;
} {
  return {
    subject: 'Set a new password for Outfold',
    text: [
      `${facts.name},`,
      '',
      'to set a new password, open this link:',
      facts.link,
      '',
      `It works once, until ${facts.expiresAt.toISOString().slice(0, 16).replace('T', ' ')} UTC. If you did not ask for it, do nothing: your password stays as it is.`,
      '',
    ].join('\n'),
  };
}

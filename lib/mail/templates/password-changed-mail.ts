/** The mail that tells a member of a new password, in case it was somebody else. Pure. */
export function passwordChangedMail(facts: { name: string; forgottenLink: string }): {
  subject: string;
  text: string;
} {
  return {
    subject: 'Your password for Outfold was changed',
    text: [
      `${facts.name},`,
      '',
      'your password has just been changed, and your other browser sessions have ended.',
      '',
      `If that was not you, set a new one at once: ${facts.forgottenLink}`,
      'and tell a lead of your lab.',
      '',
    ].join('\n'),
  };
}

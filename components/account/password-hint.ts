/** What a new password must be, in one line for under the field. */
export const passwordHint =
  '15 characters or more: a few words do well. Spaces and any letters are fine; nothing has to be mixed in.';

import type { Role } from '@/lib/contracts/lab';

/** What each role is for, as an option of a choice. */
export const roleOptions: readonly { value: Role; text: string }[] = [
  { value: 'lead', text: 'lead' },
  { value: 'analyst', text: 'analyst' },
  { value: 'experimenter', text: 'experimenter' },
  { value: 'observer', text: 'observer' },
];

/** One line a role: what it lets a member do. */
export const roleLines: readonly { role: Role; line: string }[] = [
  { role: 'lead', line: 'everything, with the lab’s members and its record' },
  { role: 'analyst', line: 'opens studies, brings sessions in, leaves out, runs readouts' },
  { role: 'experimenter', line: 'brings sessions in and leaves out; reads everything else' },
  { role: 'observer', line: 'reads everything' },
];

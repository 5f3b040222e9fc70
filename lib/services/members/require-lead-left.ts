import { AppError } from '@/lib/errors/app-error';

/** Refuses what would leave the lab without a lead. */
export function requireLeadLeft(nLeads: number): void {
  if (nLeads > 1) return;
  throw new AppError('conflict', 'This is the lab’s only lead. Make another member a lead first.');
}

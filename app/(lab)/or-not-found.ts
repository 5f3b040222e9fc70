import { notFound } from 'next/navigation';
import { AppError } from '@/lib/errors/app-error';

/** What a verb answers; where there is nothing, or it is another lab's, the page that says so. */
export async function orNotFound<T>(answer: Promise<T>): Promise<T> {
  try {
    return await answer;
  } catch (error) {
    if (error instanceof AppError && error.code === 'not-found') notFound();
    throw error;
  }
}

import 'server-only';
import { notFound } from 'next/navigation';
import { isFault } from '@/lib/faults/fault';

/**
 * A page's read, or the page “not found”: for what is not there, and for what the caller may not see, which a page does
 * not tell apart. Every other error goes on to the error page.
 */
export async function orNotFound<T>(read: Promise<T>): Promise<T> {
  try {
    return await read;
  } catch (error) {
    if (isFault(error, 'not-found') || isFault(error, 'not-allowed')) notFound();
    throw error;
  }
}

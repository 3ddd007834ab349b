import { isFault, type Fault } from '@/lib/faults/fault';

/** The fault that an act ends with; one that goes through, or fails otherwise, fails the test. */
export async function faultOf(work: Promise<unknown>): Promise<Fault> {
  try {
    await work;
  } catch (error) {
    if (isFault(error)) return error;
    throw error;
  }
  throw new Error('The act went through.');
}

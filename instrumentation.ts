/** Called by Next once in each server process. Names no Node API itself: Next reads this file for the edge runtime too. */
export async function register(): Promise<void> {
  if (process.env['NEXT_RUNTIME'] !== 'nodejs') return;
  const { startInServer } = await import('./workers/in-server');
  startInServer();
}

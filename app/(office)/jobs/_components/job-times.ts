import type { Job } from '@/lib/contracts/api/job';

/** `4 s`, `2 min 05 s`, `1 h 12 min` */
export function formatSpan(span_ms: number): string {
  const seconds = Math.max(0, Math.round(span_ms / 1000));
  if (seconds < 60) return `${seconds} s`;
  const minutes = Math.floor(seconds / 60);
  if (minutes < 60) return `${minutes} min ${String(seconds % 60).padStart(2, '0')} s`;
  return `${Math.floor(minutes / 60)} h ${String(minutes % 60).padStart(2, '0')} min`;
}

/** How long a job has run, or ran: from its first start to its end, or until now. Null before it began. */
export function jobSpan_ms(job: Job, now: number): number | null {
  if (job.started_at === null) return null;
  const end = job.finished_at === null ? now : Date.parse(job.finished_at);
  return Math.max(0, end - Date.parse(job.started_at));
}

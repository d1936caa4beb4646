import { formatDay } from '@/components/runs/time-words';
import { partNames } from '@/lib/schemas/exercise-parts';
import type { ExerciseDetail, ExerciseView } from '@/lib/schemas/exercises';

/** "due on 3 March 2026", "was due on …", "no last day". */
export function dueWords({ dueOn, isOpen }: Pick<ExerciseView, 'dueOn' | 'isOpen'>): string {
  if (dueOn === null) return 'no last day';
  const day = formatDay(`${dueOn}T00:00:00Z`);
  return isOpen ? `due on ${day}` : `was due on ${day}`;
}

/** What stands open, as the end of a sentence. */
export function openWords({ mayChange }: Pick<ExerciseView, 'mayChange'>): string {
  return mayChange.map((part) => partNames[part]).join('; ');
}

/** Where the reader stands with it. */
export function ownWords({ own }: Pick<ExerciseView, 'own'>): string {
  if (own === null) return 'not begun';
  if (own.submissions === 0) return 'begun';
  return own.submissions === 1 ? 'handed in' : `handed in ${own.submissions} times`;
}

/** "3 runs handed in by 2 of 4 who began it". */
export function handedInWords(participants: ExerciseDetail['participants'], began: number): string {
  const submitters = participants.filter(({ submissions }) => submissions.length > 0);
  const runs = submitters.reduce((sum, { submissions }) => sum + submissions.length, 0);
  if (runs === 0) return `no run yet; begun by ${began}`;
  return `${runs} ${runs === 1 ? 'run' : 'runs'} handed in by ${submitters.length} of ${began} who began it`;
}

/** "2 h 5 min" between two moments, to the minute; days where it took days. */
export function spanWords(from: string, to: string): string {
  const minutes = Math.max(0, Math.round((Date.parse(to) - Date.parse(from)) / 60_000));
  if (minutes < 60) return `${minutes} min`;
  if (minutes < 2880) return `${Math.floor(minutes / 60)} h ${minutes % 60} min`;
  return `${Math.round(minutes / 1440)} days`;
}

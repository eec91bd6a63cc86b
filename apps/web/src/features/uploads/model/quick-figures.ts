import type { FileFigures, FileRefusal } from '@masswright/geometry/web-worker';
import type { ReadingResult, ReadingTask } from './mesh-reading.worker';

/** What the browser read of a file for the question of its unit, why it can't be measured, or nothing because it could not be read here. */
export type QuickAnswer = FileFigures | FileRefusal | null;

export const isRefusal = (answer: QuickAnswer | undefined): answer is FileRefusal => answer !== undefined && answer !== null && 'error' in answer;
export const isRead = (answer: QuickAnswer | undefined): answer is FileFigures => answer !== undefined && answer !== null && !('error' in answer);

/** Beyond this a file is not read in the page: it takes the disk from the sending for longer than a person waits with the answer. */
const largestBytes = 1_000_000_000;

export interface QuickReaders {
  read: (task: ReadingTask) => void;
  /** Forgets what waits, and ends a reading under way. */
  drop: (key: string) => void;
}

/** Reads files one after the other in a thread of the page's own; it is there only while there is something to read. */
export function createQuickReaders(onAnswer: (key: string, answer: QuickAnswer) => void): QuickReaders {
  let queue: ReadingTask[] = [];
  let worker: Worker | undefined;
  let current: string | undefined;

  const next = (): void => {
    const task = queue.shift();
    current = task?.key;
    if (!task) {
      worker?.terminate();
      worker = undefined;
      return;
    }
    worker ??= startWorker();
    worker.postMessage(task);
  };

  const settle = (key: string, answer: QuickAnswer): void => {
    if (key !== current) return;
    onAnswer(key, answer);
    next();
  };

  const startWorker = (): Worker => {
    const started = new Worker(new URL('./mesh-reading.worker.ts', import.meta.url), { type: 'module' });
    started.onmessage = ({ data }: MessageEvent<ReadingResult>) => settle(data.key, data.answer);
    started.onerror = () => {
      started.terminate();
      worker = undefined;
      if (current !== undefined) settle(current, null);
    };
    return started;
  };

  return {
    read(task) {
      if (task.file.size > largestBytes) {
        onAnswer(task.key, null);
        return;
      }
      queue.push(task);
      if (current === undefined) next();
    },
    drop(key) {
      queue = queue.filter((task) => task.key !== key);
      if (key !== current) return;
      worker?.terminate();
      worker = undefined;
      next();
    },
  };
}

import { readMeshFile, type FileFigures, type FileRefusal } from '@masswright/geometry/web-worker';

export interface ReadingTask {
  key: string;
  file: File;
}
export interface ReadingResult {
  key: string;
  /** Null where the browser could not read the file. */
  answer: FileFigures | FileRefusal | null;
}

// A worker's own global scope; the compiler knows the page's.
const scope = globalThis as unknown as { onmessage: ((event: MessageEvent<ReadingTask>) => void) | null; postMessage: (result: ReadingResult) => void };

scope.onmessage = ({ data: { key, file } }) => {
  readMeshFile(file).then(
    (answer) => scope.postMessage({ key, answer }),
    () => scope.postMessage({ key, answer: null }),
  );
};

import { type ChildProcess, fork } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import type { SceneReading, SceneTask } from './readScene.ts';

interface FromWorker {
  readonly ready?: true;
  readonly reading?: SceneReading;
  readonly failure?: string;
  readonly task?: SceneTask;
}

/**
 * Reads all tasks in `processes` processes and hands each reading to `onReading` as it comes. Resolves when all are done.
 * @throws Error that names the scene and the reason when one cannot be read: no scene is left out silently
 */
export function runTasks(
  tasks: readonly SceneTask[],
  processes: number,
  onReading: (reading: SceneReading) => void,
): Promise<void> {
  const waiting = [...tasks];
  let open = tasks.length;
  return new Promise((resolve, reject) => {
    const workers: ChildProcess[] = [];
    const stop = () => {
      for (const worker of workers) {
        worker.disconnect();
      }
    };
    let settled = false;
    const fail = (reason: string) => {
      if (!settled) {
        settled = true;
        stop();
        reject(new Error(reason));
      }
    };
    if (open === 0) {
      resolve();
      return;
    }
    for (let i = 0; i < Math.min(processes, tasks.length); i++) {
      const worker = fork(fileURLToPath(new URL('./worker.ts', import.meta.url)), {
        execArgv: ['--import', 'tsx'],
        serialization: 'advanced',
      });
      workers.push(worker);
      worker.on('message', (message: FromWorker) => {
        if (message.failure) {
          fail(`${message.task?.scene}, seed ${message.task?.seed}: ${message.failure}`);
          return;
        }
        if (message.reading) {
          onReading(message.reading);
          open--;
        }
        if (open === 0 && !settled) {
          settled = true;
          stop();
          resolve();
          return;
        }
        const next = waiting.shift();
        if (next) {
          worker.send(next);
        }
      });
      worker.on('error', (error) => fail(error.message));
      worker.on('exit', (code) => {
        if (code) {
          fail(`A validation process stopped with code ${code}.`);
        }
      });
    }
  });
}

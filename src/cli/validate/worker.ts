/** A process of its own that reads scenes one after another: a task comes in, a reading goes out. */
import { loadEstimator, readScene, type SceneTask } from './readScene.ts';

const estimate = await loadEstimator();

process.on('message', (task: SceneTask) => {
  if (!estimate) {
    process.exit(2);
  }
  readScene(task, estimate).then(
    (reading) => process.send?.({ reading }),
    (error: unknown) =>
      process.send?.({ task, failure: error instanceof Error ? error.message : String(error) }),
  );
});
process.send?.({ ready: true });

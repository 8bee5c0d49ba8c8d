import { TargetScreen } from './TargetScreen.tsx';
import { targetFile } from './targetState.ts';

/** The target's screen for as long as there is a photo of one. */
export function TargetRoute() {
  const file = targetFile.value;
  return file ? <TargetScreen file={file} /> : null;
}

import type { Tilt } from '../view/tilt.ts';
import { tiltFromSensor } from '../view/tiltSensor.ts';

/** Readings are averaged over this long: a hand trembles. */
const LISTEN_MS = 700;
/** A sensor that has said nothing by then is not there. */
const GIVE_UP_MS = 2500;

/** What some browsers add: the sensor is read only after a person allows it. */
interface AskingEvent {
  readonly requestPermission?: () => Promise<string>;
}

export const hasTiltSensor = (): boolean => 'DeviceOrientationEvent' in globalThis;

/**
 * The tilt of the rear camera now, from the phone's own sensor; to be called from a tap, since some browsers then ask.
 * @throws Error with a sentence where it is not allowed or gives nothing
 */
export async function readTilt(): Promise<Tilt> {
  const asking = DeviceOrientationEvent as unknown as AskingEvent;
  if (asking.requestPermission && (await asking.requestPermission()) !== 'granted') {
    throw new Error(
      'The tilt sensor was not allowed. Mark the horizon instead, type the tilt, or allow motion sensors for this page.',
    );
  }
  const sum = { right: 0, up: 0, count: 0, pitch: 0 };
  return new Promise((resolve, reject) => {
    const heard = (event: DeviceOrientationEvent) => {
      if (event.beta === null || event.gamma === null) return;
      const tilt = tiltFromSensor(event.beta, event.gamma, screen.orientation?.angle ?? 0);
      sum.pitch += tilt.pitchRad;
      sum.right += Math.sin(tilt.rollRad);
      sum.up += Math.cos(tilt.rollRad);
      sum.count++;
      if (sum.count === 1) setTimeout(finish, LISTEN_MS);
    };
    const finish = () => {
      removeEventListener('deviceorientation', heard);
      clearTimeout(giveUp);
      resolve({ pitchRad: sum.pitch / sum.count, rollRad: Math.atan2(sum.right, sum.up) });
    };
    const giveUp = setTimeout(() => {
      if (sum.count > 0) return;
      removeEventListener('deviceorientation', heard);
      reject(new Error('This device has no tilt sensor that answers. Mark the horizon, or type the tilt.'));
    }, GIVE_UP_MS);
    addEventListener('deviceorientation', heard);
  });
}

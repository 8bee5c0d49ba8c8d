import * as v from 'valibot';
import { OBSERVATION_KIND, type Observation, SCHEMA_VERSION } from './observation.ts';
import { observationSchema } from './observationSchema.ts';

/** Why a record cannot be read or kept, in one sentence that says what to do. */
export class RecordError extends Error {
  override readonly name = 'RecordError';
}

/** Steps that lift an observation of version `key` to the next one. */
export type Migrations = Readonly<
  Record<number, (older: Record<string, unknown>) => Record<string, unknown>>
>;

/** None yet: version 1 is the first. */
export const MIGRATIONS: Migrations = {};

/** The observation as text: what `observation.json` holds. Reading it and writing it again gives the same bytes. */
export function writeObservation(observation: Observation): string {
  return `${JSON.stringify(observation, mustBeJson, 2)}\n`;
}

/** JSON turns NaN into null in silence; a record must not. */
function mustBeJson(key: string, value: unknown): unknown {
  if (typeof value === 'number' && !Number.isFinite(value)) {
    throw new RecordError(`The observation holds no number at "${key}": save it again.`);
  }
  return value;
}

/**
 * Reads `observation.json`.
 * @throws RecordError where it is no JSON, no observation, or of a newer version
 */
export function parseObservation(text: string): Observation {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    throw new RecordError('The observation in this file is damaged (not JSON): take it from another copy.');
  }
  return readObservation(value);
}

/**
 * Checks an observation from outside or from storage, and lifts it to the present version first.
 * @throws RecordError with one sentence that names the place and what is wrong there
 */
export function readObservation(value: unknown): Observation {
  const lifted = migrate(value, MIGRATIONS, SCHEMA_VERSION);
  const parsed = v.safeParse(observationSchema, lifted);
  // The value itself, not the parser's copy: a copy has its keys in another order and would not write the same bytes.
  if (parsed.success) return lifted as unknown as Observation;
  const [issue] = parsed.issues;
  const place = issue.path?.map(({ key }) => String(key)).join('.') ?? '';
  throw new RecordError(
    `This observation cannot be read: ${place ? `"${place}": ` : ''}${issue.message.replaceAll('\n', ' ')}.`,
  );
}

/**
 * Applies the steps from the observation's version up to `version`.
 * @throws RecordError where it is no observation, of a newer version, or a step is missing
 */
export function migrate(value: unknown, steps: Migrations, version: number): Record<string, unknown> {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) {
    throw new RecordError('This is not an observation of Tintfathom: choose the ZIP that it exported.');
  }
  let lifted = value as Record<string, unknown>;
  if (lifted.kind !== OBSERVATION_KIND) {
    throw new RecordError('This is not an observation of Tintfathom: choose the ZIP that it exported.');
  }
  for (;;) {
    const from = lifted.schemaVersion;
    if (from === version) return lifted;
    if (typeof from !== 'number' || !Number.isInteger(from) || from < 1) {
      throw new RecordError('This observation does not say its version: take it from another copy.');
    }
    if (from > version) {
      throw new RecordError(
        `This observation was made by a newer Tintfathom (record version ${from}, here ${version}): update the app and open it again.`,
      );
    }
    const step = steps[from];
    if (!step) throw new RecordError(`Observations of record version ${from} can no longer be read.`);
    lifted = { ...step(lifted), schemaVersion: from + 1 };
  }
}

export interface StorageState {
  /** Bytes; null where the browser does not say. */
  readonly usedBytes: number | null;
  readonly quotaBytes: number | null;
  /** Whether the browser promised not to clear it by itself. */
  readonly isPersistent: boolean;
  /** A sentence from 80 % on; null below. */
  readonly warning: string | null;
}

const WARN_FROM = 0.8;

/** How full this device's room for the app is. */
export async function storageState(): Promise<StorageState> {
  const isPersistent = (await navigator.storage?.persisted?.().catch(() => false)) ?? false;
  const estimate = await navigator.storage?.estimate?.().catch(() => null);
  const usedBytes = estimate?.usage ?? null;
  const quotaBytes = estimate?.quota ?? null;
  const share = usedBytes !== null && quotaBytes ? usedBytes / quotaBytes : 0;
  return {
    usedBytes,
    quotaBytes,
    isPersistent,
    warning:
      share >= WARN_FROM
        ? `The room for observations is ${Math.round(100 * share)} % full: export the older ones as ZIP and delete them here.`
        : null,
  };
}

import { signal } from '@preact/signals';

/** The photo of a colour target that is being measured; the work waits behind it. */
export const targetFile = signal<File | null>(null);

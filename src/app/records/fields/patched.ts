/** A copy with the given fields set; those given as undefined are taken away, for a record has no empty fields. */
export function patched<T extends object>(base: T, patch: { readonly [K in keyof T]?: T[K] | undefined }): T {
  const merged = { ...base, ...patch } as Record<string, unknown>;
  for (const key of Object.keys(merged)) if (merged[key] === undefined) delete merged[key];
  return merged as T;
}

/** Typed text, or nothing where only blanks are left. */
export function said(text: string): string | undefined {
  return text.trim() === '' ? undefined : text;
}

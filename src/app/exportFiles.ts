/** Version of the app, from package.json at build time. */
declare const __APP_VERSION__: string;

/** Hands a file to the person. */
export function hand(name: string, content: Blob): void {
  const link = document.createElement('a');
  link.href = URL.createObjectURL(content);
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(link.href), 10_000);
}

/** What stands at the foot of a map that leaves the app. */
export const footLine = (photo: string) => `${photo} · indicative only · Tintfathom ${__APP_VERSION__}`;

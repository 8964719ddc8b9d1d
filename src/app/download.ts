/** Hands a file to the browser's own saving. */
const KEPT_FOR = 10_000;

export function download(content: Blob, name: string): void {
  const url = URL.createObjectURL(content);
  const link = document.createElement("a");
  link.href = url;
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(url), KEPT_FOR);
}

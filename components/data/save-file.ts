/** Has the browser save a file under a name. */
export function saveFile({ bytes, name }: { readonly bytes: Blob; readonly name: string }): void {
  const address = URL.createObjectURL(bytes);
  const link = document.createElement('a');
  link.href = address;
  link.download = name;
  link.click();
  // Some browsers read it only after this turn.
  setTimeout(() => URL.revokeObjectURL(address), 60_000);
}

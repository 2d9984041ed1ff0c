/** Hands bytes to the browser as a file to keep. */
export function saveFile(name: string, content: Blob): void {
  const address = URL.createObjectURL(content);
  const link = document.createElement('a');
  link.href = address;
  link.download = name;
  link.click();
  URL.revokeObjectURL(address);
}

export const saveText = (name: string, text: string, mediaType: string): void =>
  saveFile(name, new Blob([text], { type: mediaType }));

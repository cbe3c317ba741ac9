/** A picked or dropped file as a request takes it: its name and its bytes in base64. */

export interface PickedFile {
  readonly fileName: string;
  readonly bytesBase64: string;
  readonly size: number;
}

export function readFile(file: File): Promise<PickedFile> {
  return new Promise((resolve, reject) => {
    const reader = new FileReader();
    reader.onerror = () => reject(reader.error ?? new Error("the file could not be read"));
    reader.onload = () => {
      const address = reader.result as string;
      resolve({ fileName: file.name, bytesBase64: address.slice(address.indexOf(",") + 1), size: file.size });
    };
    reader.readAsDataURL(file);
  });
}

/** 7.4 kB, 12 MB */
export function sizeWords(bytes: number): string {
  if (bytes < 1000) return `${bytes} bytes`;
  const [unit, value] = bytes < 1e6 ? ["kB", bytes / 1e3] : ["MB", bytes / 1e6];
  return `${value < 10 ? value.toFixed(1) : Math.round(value)} ${unit}`;
}

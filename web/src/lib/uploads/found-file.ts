/** A file that a person dropped or chose. */
export interface FoundFile {
  file: File;
  /** The folders above it and its name: "card 1/HL_0412.jpg". */
  path: string;
  /** Where the browser gives one, the file can be opened again after a reload. */
  handle?: FileSystemFileHandle;
  /** The dropped folder it came from: one permission for all of its files. */
  root?: FileSystemDirectoryHandle;
}

/** The files of an `<input type="file">`, with or without webkitdirectory. */
export function filesOfInput(list: FileList | readonly File[]): FoundFile[] {
  return Array.from(list, (file) => ({ file, path: file.webkitRelativePath || file.name }));
}

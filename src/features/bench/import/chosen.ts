/** One file, or a text that was pasted. */
export interface Chosen {
  readonly name: string;
  readonly file: File | null;
  readonly text: string;
}

/** What is kept with the revision: the file, or the text that was pasted as one. */
export const fileOf = ({ file, text, name }: Chosen): File =>
  file ?? new File([text], `${name}.txt`, { type: 'text/plain' });

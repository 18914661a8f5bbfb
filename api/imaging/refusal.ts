/** Why a file is not taken in. The codes are for programs, the sentences for the person who brought the file. */
export type RefusalCode =
  'empty' | 'too-large' | 'not-a-picture' | 'unsupported' | 'animated' | 'too-many-pixels' | 'damaged' | 'no-preview';

/** A file that is refused for what it is, not for a fault of ours: trying again would change nothing. */
export class Refusal extends Error {
  override name = 'Refusal';
  readonly code: RefusalCode;

  constructor(code: RefusalCode, sentence: string) {
    super(sentence);
    this.code = code;
  }
}

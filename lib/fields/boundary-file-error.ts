export type BoundaryFileCode = "empty-file" | "unknown-file-kind" | "file-damaged" | "file-unsafe" | "no-polygon";

/** Why a boundary file could not be read: what, where, which rule. */
export interface BoundaryFileError {
  code: BoundaryFileCode;
  message: string;
}

/** Carries the error out of a parser to `readBoundaryFile`, which turns it into a Result. */
export class BoundaryFileFailure extends Error {
  readonly error: BoundaryFileError;

  constructor(code: BoundaryFileCode, message: string) {
    super(message);
    this.name = "BoundaryFileFailure";
    this.error = { code, message };
  }
}

import type { Outcome } from '../calc/problem.js';
import type { DrawnPictures, PictureProblem } from '../picture/picture-problem.js';
import type { ObjectFile } from '../study/object-file.js';

/** A numbered ask for two pictures of an object. */
export interface PictureAsk {
  readonly number: number;
  readonly problem: PictureProblem;
  readonly object: ObjectFile;
}

/** What comes back, with the number of its ask. */
export interface PictureReply {
  readonly number: number;
  readonly drawn: Outcome<DrawnPictures>;
}

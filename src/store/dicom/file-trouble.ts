import { cleanText } from '../../study/clean-text.js';
import { type StoreProblem, storeProblem } from '../problem-of-error.js';
import type { ObjectTrouble } from './parse-object.js';

/** What may be wrong with a file that headers are sought in. */
export type FileTrouble = ObjectTrouble | 'zip' | 'not-mr' | 'cut' | 'too-long' | 'not-json' | 'no-sidecar' | 'loop' | 'too-deep';

/** What is said and what to do. Fixed words and the path alone: nothing of what the file holds. */
const troubles: Readonly<Record<FileTrouble, { readonly code: string; readonly says: string; readonly hint: string }>> = {
  'no-object': {
    code: 'no-object',
    says: 'is neither a DICOM object nor a sidecar',
    hint: 'Name DICOM objects, sidecars (.json), or a folder of them.',
  },
  'big-endian': {
    code: 'big-endian',
    says: 'is stored big endian, a retired form that is not read',
    hint: 'Export it again, explicit little endian.',
  },
  damaged: { code: 'object-damaged', says: 'is damaged or cut short: its header ends before it should', hint: 'Export or copy it again.' },
  'inflates-too-far': { code: 'inflates-too-far', says: 'inflates past 64 MB and was given up', hint: 'Export it again, not deflated.' },
  zip: { code: 'packed-file', says: 'is a packed file (zip or gzip)', hint: 'Unpack it, then name its folder.' },
  'not-mr': { code: 'not-mr', says: 'holds no MR image', hint: 'Nothing of it was used.' },
  cut: { code: 'object-cut', says: 'is cut short within its pixels; its header was read', hint: 'Copy it again if the pictures matter.' },
  'too-long': {
    code: 'header-too-long',
    says: 'has a header of more than 8 MB and was given up',
    hint: 'Check that this is the right file.',
  },
  'not-json': { code: 'not-json', says: 'is no JSON', hint: 'A sidecar is one JSON object; export it again.' },
  'no-sidecar': { code: 'no-sidecar', says: 'is JSON without any field of an MR sidecar', hint: 'Name the sidecar of an MR series.' },
  loop: { code: 'link-loop', says: 'leads round in a circle and was not read again', hint: 'Mend the link.' },
  'too-deep': { code: 'too-deep', says: 'lies more than 40 folders deep and was not read', hint: 'Name a folder further in.' },
};

/** Trouble with a file as a problem that can be shown. */
export function fileTrouble(trouble: FileTrouble, path: string): StoreProblem {
  const { code, says, hint } = troubles[trouble];
  return storeProblem(code, 65, path, `${cleanText(path)} ${says}.`, hint);
}

/** What is wrong with files of one kind, without any name: the name of a file may be that of a person. */
export function namelessTrouble(code: string, files: number): string {
  const says = Object.values(troubles).find((trouble) => trouble.code === code)?.says ?? `cannot be read (${code})`;
  return `${files === 1 ? '1 file' : `${files} files, each`} ${says}`;
}

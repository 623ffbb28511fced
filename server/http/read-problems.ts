import type { ReadError } from '../../core/formats/read-types.ts';
import { Problem, type ProblemPlace, type ProblemSlug } from '../problems.ts';

/** Codes of the readers that are more than an unreadable file; every other one is a 422. */
const slugs: Readonly<Record<string, ProblemSlug>> = {
  columns_to_confirm: 'columns-to-confirm',
  binary_file: 'unknown-file-kind',
  too_many_bytes: 'too-large',
  too_many_points: 'too-large',
  unknown_kind: 'unknown-file-kind',
};

/** The problem that tells a member why a file was refused, where, and what to do. */
export function readProblem(error: ReadError): Problem {
  const { code, detail, remedy, line, column, parameter, proposal } = error;
  const place: ProblemPlace = {
    detail,
    ...(line === undefined ? {} : { line }),
    ...(column === undefined ? {} : { column }),
    ...(parameter === undefined ? {} : { parameter }),
  };
  return new Problem(slugs[code] ?? 'unreadable-file', {
    detail: `${detail} ${remedy}`,
    errors: [place],
    members: {
      code,
      remedy,
      ...(proposal === undefined
        ? {}
        : {
            proposal: {
              columns: proposal.columns,
              evidence: proposal.evidence,
              first_rows: proposal.firstRows,
            },
          }),
    },
  });
}

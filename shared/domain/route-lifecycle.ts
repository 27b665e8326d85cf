/** States of a route and of a submission, as data: what is not listed here cannot happen. */
export const routeStatuses = ['draft', 'in review', 'approved', 'returned'] as const;
export type RouteStatus = (typeof routeStatuses)[number];

export const submissionStatuses = ['open', 'signed', 'returned', 'withdrawn'] as const;
export type SubmissionStatus = (typeof submissionStatuses)[number];

type Move<Status> = { readonly from: readonly Status[]; readonly to: Status };

export const routeMoves = {
  edit: { from: ['draft', 'returned', 'approved'], to: 'draft' },
  submit: { from: ['draft', 'returned', 'approved'], to: 'in review' },
  approve: { from: ['in review'], to: 'approved' },
  return: { from: ['in review'], to: 'returned' },
  withdraw: { from: ['in review'], to: 'draft' },
} as const satisfies Record<string, Move<RouteStatus>>;

export const submissionMoves = {
  sign: { from: ['open'], to: 'signed' },
  return: { from: ['open'], to: 'returned' },
  withdraw: { from: ['open'], to: 'withdrawn' },
} as const satisfies Record<string, Move<SubmissionStatus>>;

export function mayMove<Status>(move: Move<Status>, from: Status): boolean {
  return move.from.includes(from);
}

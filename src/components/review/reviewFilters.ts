export const reviewFilterNames = [
  'projectId',
  'batchId',
  'verdict',
  'findingKind',
  'decided',
  'clearToBelowHz',
  'search',
  'sort',
] as const;
export type ReviewFilterName = (typeof reviewFilterNames)[number];

export const sortItems = [
  { value: 'foldScore', title: 'Fold score, highest first' },
  { value: 'clearTo', title: 'Clear-to, lowest first' },
  { value: 'newest', title: 'Newest first' },
  { value: 'oldest', title: 'Oldest first' },
  { value: 'fileName', title: 'Name' },
];

export const decidedItems = [
  { value: 'no', title: 'Waiting' },
  { value: 'yes', title: 'Decided' },
  { value: 'all', title: 'All' },
];

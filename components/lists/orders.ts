/** Orders that lists offer, by the names that the API gives them. */
export const ORDERS = [
  { value: 'createdAt', label: 'Oldest first' },
  { value: 'name', label: 'Name, A to Z' },
  { value: '-name', label: 'Name, Z to A' },
] as const;

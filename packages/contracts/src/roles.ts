/** What a person may be; several at once. A retailer is outside and reaches only the counter. */
export const ROLES = ['owner', 'dealer', 'buyer', 'bookkeeper', 'retailer'] as const;
export type Role = (typeof ROLES)[number];

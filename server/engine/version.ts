/** Changes whenever a computed number can change: estimates are cached and decisions dated by it. */
export const engineVersion = '0.2.0';

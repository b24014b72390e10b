import { FirstSchema1796083200000 } from './1796083200000-FirstSchema.js';
import { ContributionVersions1796086800000 } from './1796086800000-ContributionVersions.js';

/** Every migration, oldest first. */
export const migrations = [FirstSchema1796083200000, ContributionVersions1796086800000];

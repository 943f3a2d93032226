import { CreatePeople1764570000000 } from './migrations/1764570000000-create-people';

/** Every migration in order; one that has been merged is never edited. */
export const migrations = [CreatePeople1764570000000];

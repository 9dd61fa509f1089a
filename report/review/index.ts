export { isLoopback } from './host-check.ts';
export type { ReviewPlaces } from './night-shelf.ts';
export { shelvedNights } from './night-shelf.ts';
export { nightAddress } from './pages.ts';
export { reviewServer } from './review-server.ts';

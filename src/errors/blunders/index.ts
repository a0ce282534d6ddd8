export { type BlunderCause, type Blunders, suspectBlunders } from './suspectBlunders.js';

export { type Showable, show } from './show.js';

export { percent } from '@hubtack/contracts/fixes/percent.js';

export { RangeStrip } from './range-strip';

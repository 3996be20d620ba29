export { highestOpenGapVoltage } from '../onset/highest-voltage.ts';

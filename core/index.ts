export { fail, ok, type Result } from './result.ts';
export {
  type ComplexSweep,
  makeSweep,
  type PhaseKnowledge,
  reflectionMagnitude,
  type ScalarSweep,
  type Sweep,
  type SweepError,
} from './sweep.ts';

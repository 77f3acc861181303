/** The reported solution against truth: RMS errors and average NEES. */
import type { TruthStatistics } from '@/shared/contracts/runs';
import { radToDeg } from '@/shared/units';
import { ATTITUDE, POSITION, sizeOf, VELOCITY } from '../filter/states';
import type { ReferenceColumns } from '../types';
import { emptyError, ReferenceReader, stateError } from './reference';

export class TruthComparison {
  private readonly reader: ReferenceReader;
  private readonly error = emptyError();
  private epochs = 0;
  private readonly position = new SquareSum();
  private readonly velocity = new SquareSum();
  private readonly attitude = new SquareSum();

  constructor(reference: ReferenceColumns) {
    this.reader = new ReferenceReader(reference);
  }

  add(timeS: number, nav: Float64Array, p: Float64Array): void {
    if (!this.reader.read(timeS)) return;
    stateError(nav, this.reader.state, this.error);
    this.epochs += 1;
    this.position.add(this.error.position, p, POSITION);
    this.velocity.add(this.error.velocity, p, VELOCITY);
    this.attitude.add(this.error.attitude, p, ATTITUDE);
  }

  result(): TruthStatistics | null {
    const { position, velocity, attitude } = this;
    if (position.count === 0) return null;
    const [n, e, d] = position.meanSquares();
    const v = velocity.count > 0 ? velocity.meanSquares() : null;
    const a = attitude.count > 0 ? attitude.meanSquares().map((x) => radToDeg(Math.sqrt(x))) : null;
    return {
      positionRmseM: Math.sqrt(n + e + d),
      horizontalRmseM: Math.sqrt(n + e),
      verticalRmseM: Math.sqrt(d),
      velocityRmseMPerS: v === null ? null : Math.sqrt(v[0] + v[1] + v[2]),
      // About north, east, down; a vehicle near level: its roll and pitch together, and yaw.
      attitudeRmseDeg: a === null ? null : { roll: a[0]!, pitch: a[1]!, yaw: a[2]! },
      aneesPosition: position.meanNees(),
      aneesVelocity: velocity.count > 0 ? velocity.meanNees() : null,
      aneesAttitude: attitude.count > 0 ? attitude.meanNees() : null,
      epochs: this.epochs,
    };
  }
}

/** Squares and NEES of a 3-vector over epochs; a vector with a NaN is passed over. */
class SquareSum {
  count = 0;
  private readonly squares = new Float64Array(3);
  private nees = 0;

  add(error: Float64Array, p: Float64Array, first: number): void {
    const [x, y, z] = [error[0]!, error[1]!, error[2]!];
    if (!Number.isFinite(x + y + z)) return;
    this.count += 1;
    this.squares[0] = this.squares[0]! + x * x;
    this.squares[1] = this.squares[1]! + y * y;
    this.squares[2] = this.squares[2]! + z * z;
    this.nees += nees3(x, y, z, p, first);
  }

  meanSquares(): [number, number, number] {
    return [this.squares[0]! / this.count, this.squares[1]! / this.count, this.squares[2]! / this.count];
  }

  meanNees(): number {
    return this.nees / this.count;
  }
}

/** eᵀP⁻¹e for the 3×3 block of P of the states from `first` on. */
function nees3(x: number, y: number, z: number, p: Float64Array, first: number): number {
  const size = sizeOf(p);
  const at = first * (size + 1);
  // Cholesky, then forward substitution.
  const l00 = Math.sqrt(p[at]!);
  const l10 = p[at + size]! / l00;
  const l20 = p[at + 2 * size]! / l00;
  const l11 = Math.sqrt(p[at + size + 1]! - l10 * l10);
  const l21 = (p[at + 2 * size + 1]! - l20 * l10) / l11;
  const l22 = Math.sqrt(p[at + 2 * size + 2]! - l20 * l20 - l21 * l21);
  const a = x / l00;
  const b = (y - l10 * a) / l11;
  const c = (z - l20 * a - l21 * b) / l22;
  return a * a + b * b + c * c;
}

/** The update with states behind the fifteen: as MeasurementUpdate, of any size. */
import { MAX_ROWS, MeasurementUpdate } from './measurement-update';
import { STATES, type StateLayout } from './states';

export class WideUpdate extends MeasurementUpdate {
  protected override formGain(ph: Float64Array): void {
    const { size, gain, inverse, innovation, correction } = this;
    for (let i = 0; i < size; i += 1) {
      correction[i] = 0;
      for (let m = 0; m < MAX_ROWS; m += 1) {
        let k = 0;
        for (let n = 0; n < MAX_ROWS; n += 1) k += ph[i * MAX_ROWS + n]! * inverse[n * MAX_ROWS + m]!;
        gain[i * MAX_ROWS + m] = k;
        correction[i] = correction[i]! + k * innovation[m]!;
      }
    }
  }

  protected override joseph(p: Float64Array, ph: Float64Array, s: Float64Array): void {
    const { size, gain } = this;
    for (let i = 0; i < size; i += 1)
      for (let j = i; j < size; j += 1) {
        let value = p[i * size + j]!;
        for (let m = 0; m < MAX_ROWS; m += 1) {
          // (KS − PHᵀ) of row i.
          let rest = -ph[i * MAX_ROWS + m]!;
          for (let n = 0; n < MAX_ROWS; n += 1) rest += gain[i * MAX_ROWS + n]! * s[n * MAX_ROWS + m]!;
          value += rest * gain[j * MAX_ROWS + m]! - gain[i * MAX_ROWS + m]! * ph[j * MAX_ROWS + m]!;
        }
        p[i * size + j] = value;
        p[j * size + i] = value;
      }
  }

  protected override project(p: Float64Array, out: Float64Array): void {
    const { size, h, columns, columnCount } = this;
    for (let i = 0; i < size; i += 1)
      for (let m = 0; m < MAX_ROWS; m += 1) {
        let sum = 0;
        for (let n = 0; n < columnCount; n += 1)
          sum += p[i * size + columns[n]!]! * h[m * size + columns[n]!]!;
        out[i * MAX_ROWS + m] = sum;
      }
  }

  protected override innovationCovariance(ph: Float64Array, out: Float64Array): void {
    const { size, h, columns, columnCount, r } = this;
    for (let a = 0; a < MAX_ROWS; a += 1)
      for (let b = a; b < MAX_ROWS; b += 1) {
        let sum = a === b ? r[a]! : 0;
        for (let n = 0; n < columnCount; n += 1)
          sum += h[a * size + columns[n]!]! * ph[columns[n]! * MAX_ROWS + b]!;
        out[a * MAX_ROWS + b] = sum;
        out[b * MAX_ROWS + a] = sum;
      }
  }
}

/** The update that fits a layout. */
export const updateOf = ({ size }: StateLayout): MeasurementUpdate =>
  size === STATES ? new MeasurementUpdate() : new WideUpdate(size);

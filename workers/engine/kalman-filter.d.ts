/** The part of the `kalman-filter` package that the GNSS-only track uses; the package ships no types. */
declare module 'kalman-filter' {
  type Matrix = number[][];
  /** A mean (n×1) with its covariance (n×n). */
  export class State {
    constructor(state: { mean: Matrix; covariance: Matrix; index?: number });
    mean: Matrix;
    covariance: Matrix;
    index?: number;
  }
  /** `O` is what the caller hands to predict and correct beside the state: the model's functions receive it. */
  export class KalmanFilter<O extends object> {
    constructor(options: {
      observation: { dimension: number; stateProjection: Matrix; covariance: (options: O) => Matrix };
      dynamic: {
        dimension: number;
        init: { mean: Matrix; covariance: Matrix; index?: number };
        transition: (options: O) => Matrix;
        covariance: (options: O) => Matrix;
      };
    });
    predict(options: O & { previousCorrected: State }): State;
    correct(options: O & { predicted: State; observation: number[] }): State;
  }
}

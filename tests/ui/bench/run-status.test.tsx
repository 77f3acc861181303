import { act, screen } from '@testing-library/react-native';
import { RunProblem, RunStatus } from '@/components/bench/RunStatus';
import { renderAs } from '../render';
import { BenchStand, type BenchSeen } from './stand';

let seen: BenchSeen;
const show = () =>
  renderAs(
    <BenchStand onBench={(bench) => (seen = bench)}>
      {(bench) => (
        <>
          <RunStatus bench={bench} />
          <RunProblem bench={bench} />
        </>
      )}
    </BenchStand>,
  );

test('a lost connection is said with what happens next, and no longer once it is back', () => {
  show();
  expect(screen.queryByText(/connection/i)).toBeNull();
  act(() => seen.line().lost());
  expect(screen.getByText(/^Connection lost, trying again …/)).toBeOnTheScreen();
  expect(screen.getByText('The connection to the server is lost')).toBeOnTheScreen();
  expect(screen.getByText(/runs as soon as the server answers/)).toBeOnTheScreen();
  act(() => seen.line().reconnected());
  expect(screen.queryByText(/connection/i)).toBeNull();
});

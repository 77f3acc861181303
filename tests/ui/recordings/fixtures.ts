import type { Recording } from '@/shared/contracts/recordings';

/** A decoded recording; `overrides` says what is different. */
export const recordingOf = (overrides: Partial<Recording> = {}): Recording => ({
  id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e20',
  name: 'Breakwater loop 3',
  notes: '',
  status: 'ready',
  progress: 1,
  problems: [],
  remedies: [],
  vehicleId: null,
  vehicleName: 'Crawler 2',
  createdAt: '2026-11-03T08:00:00Z',
  createdBy: 'Maren Holt',
  startS: 0,
  endS: 1240,
  durationS: 1240,
  hasReference: false,
  timeOrigin: null,
  health: {
    verdict: 'with-care',
    sentence: 'Usable, but look at the clipping.',
    imu: { samples: 124_001, rateHz: 100, gaps: 1 },
    gnss: {
      epochs: 6201,
      rateHz: 5,
      hasVelocity: true,
      hasPositionSigma: true,
      hasVelocitySigma: false,
    },
    overlapS: [0, 1240],
    findings: [
      {
        code: 'clipped',
        severity: 'warn',
        sentence: 'The z accelerometer stands at its range for 40 ms.',
        figure: { value: 40, unit: 'ms' },
        intervalsS: [[696, 696.04]],
        remedy: 'Mount it softer or take a wider range.',
      },
    ],
  },
  strip: null,
  files: [],
  channelMap: null,
  previews: [],
  ...overrides,
});

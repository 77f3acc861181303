/** Addresses of pages that take an id. */
import type { Href } from 'expo-router';
import { benchHref } from '@/components/bench/bench-link';

type Query = Readonly<Record<string, string>>;

/** `query` of a list that stays beside it. */
export const recordingPath = (id: string, query?: Query): Href => ({
  pathname: '/recordings/[id]',
  params: { ...query, id },
});
export const mappingPath = (id: string): Href => ({ pathname: '/recordings/[id]/mapping', params: { id } });
export const noisePath = (id: string): Href => ({ pathname: '/recordings/[id]/noise', params: { id } });
export const setPath = (id: string, query?: Query): Href => ({
  pathname: '/sets/[id]',
  params: { ...query, id },
});
export const versionPath = (setId: string, number: number): Href =>
  setPath(setId, { version: String(number) });
export const verificationPath = (setId: string, number: number): Href => ({
  pathname: '/sets/[id]/verification',
  params: { id: setId, version: String(number) },
});
export const reportPath = (setId: string, version: number): Href => ({
  pathname: '/sets/[id]/report',
  params: { id: setId, version: String(version) },
});
export const vehiclePath = (id: string, query?: Query): Href => ({
  pathname: '/vehicles/[id]',
  params: { ...query, id },
});

export const requirementPath = (id: string): Href => ({ pathname: '/requirements/[id]', params: { id } });

/** The bench over a recording, optionally with a version's parameters. */
export const benchPath = (recordingId: string, version?: { setId: string; number: number }): Href =>
  hrefOf(benchHref({ recordingId, setId: version?.setId, version: version?.number }));

/** A path that is only known while running, as the router's type. */
export function hrefOf(path: string): Href;
export function hrefOf(path: unknown): unknown {
  return path;
}

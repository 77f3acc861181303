/** The browser that the tests drive. */
import { existsSync } from 'node:fs';
import { aptInstall } from './apt';

const PLACES = ['/usr/bin/chromium', '/usr/bin/chromium-browser'];

/** Path of Chromium (CHROMIUM, or where Debian puts it); installed where it is missing, or an error that says how. */
export function findChromium(log: (line: string) => void): string {
  const given = process.env.CHROMIUM;
  if (given) {
    if (!existsSync(given)) throw new Error(`CHROMIUM is "${given}", and there is no such file.`);
    return given;
  }
  const found = () => PLACES.find((place) => existsSync(place));
  if (!found()) aptInstall('chromium', ', or set CHROMIUM to the path of one', log);
  const place = found();
  if (!place)
    throw new Error(`Chromium was installed, but is at none of ${PLACES.join(', ')}. Set CHROMIUM.`);
  return place;
}

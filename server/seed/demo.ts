/** The invented demonstration. */
import type { Context } from '../context';

export async function seedDemo(_ctx: Context): Promise<void> {}

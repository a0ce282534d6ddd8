import { z } from 'zod';

/*
 * What the schemas of results share.
 */

export const component = z.enum(['horizontal', 'vertical']);
export const form = z.enum(['root-sum-square', 'linear-sum']);
export const count = z.number().int().gte(0);
export const nullable = z.number().nullable();
export const limits = z.strictObject({ estimate: nullable, low: nullable, high: nullable });
export const interval = z.strictObject({ estimate: z.number(), low: nullable, high: nullable });
export const day = z.string();
export const axes = z.strictObject({ east: nullable, north: nullable, up: nullable });

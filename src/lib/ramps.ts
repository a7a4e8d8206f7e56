/**
 * The colour ramps as CSS variable names, and as numbers for WebGL.
 * Diverging has nine steps around a centre (low and high, never bad and good); sequential has seven.
 */

export type RampKind = 'diverging' | 'sequential';
export type Rgb = [red: number, green: number, blue: number];

export const RAMP_STEPS = { diverging: 9, sequential: 7 } as const;

/** Step 1…9 of a value around `centre`; `spread` is the distance at which the last step begins to be reached. */
export function divergingStep(value: number, centre: number, spread: number): number {
  if (!(spread > 0)) return 5;
  const place = Math.max(-1, Math.min(1, (value - centre) / spread));
  return Math.min(9, Math.floor(((place + 1) / 2) * 9) + 1);
}

/** Step 1…7 of a value between `lowest` and `highest`. */
export function sequentialStep(value: number, lowest: number, highest: number): number {
  if (!(highest > lowest)) return 1;
  const place = Math.max(0, Math.min(1, (value - lowest) / (highest - lowest)));
  return Math.min(7, Math.floor(place * 7) + 1);
}

/** CSS variable name of a step: `--div-3`, `--seq-7`. */
export function rampVariable(kind: RampKind, step: number): string {
  return `--${kind === 'diverging' ? 'div' : 'seq'}-${step}`;
}

/** `var(--div-3)`, ready for a style or a fill. */
export function rampColour(kind: RampKind, step: number): string {
  return `var(${rampVariable(kind, step)})`;
}

/** The ink that figures on a sequential step take. */
export function rampInk(step: number): string {
  return `var(--seqi-${step})`;
}

/** All variable names of a ramp, low to high. */
export function rampVariables(kind: RampKind): string[] {
  return Array.from({ length: RAMP_STEPS[kind] }, (_, i) => rampVariable(kind, i + 1));
}

/** "#EDE7DA" or "rgb(237 231 218)" → [237, 231, 218]; null when it is neither. */
export function parseRgb(text: string): Rgb | null {
  const hex = /^#([\da-f]{2})([\da-f]{2})([\da-f]{2})$/i.exec(text.trim());
  if (hex) return [parseInt(hex[1] ?? '', 16), parseInt(hex[2] ?? '', 16), parseInt(hex[3] ?? '', 16)];
  const rgb = /^rgba?\(\s*([\d.]+)[\s,]+([\d.]+)[\s,]+([\d.]+)/i.exec(text.trim());
  return rgb ? [Number(rgb[1]), Number(rgb[2]), Number(rgb[3])] : null;
}

/** A token's value as 0…255 numbers, read from a computed style: `readToken(getComputedStyle(el), '--c-ink')`. */
export function readToken(style: { getPropertyValue(name: string): string }, name: string): Rgb {
  return parseRgb(style.getPropertyValue(name)) ?? [128, 128, 128];
}

/** The steps of a ramp as numbers, low to high. */
export function readRamp(style: { getPropertyValue(name: string): string }, kind: RampKind): Rgb[] {
  return rampVariables(kind).map((name) => readToken(style, name));
}

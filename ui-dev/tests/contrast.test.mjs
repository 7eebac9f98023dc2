// Contrast by the formula of WCAG 2.2 (relative luminance and contrast ratio), for every pair that the tokens promise.

import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { test } from 'node:test';

const text = readFileSync(new URL('../../ui/styles/tokens.css', import.meta.url), 'utf8');

/** @param {string} theme */
function tokens(theme) {
  const block = new RegExp(`\\[data-theme="${theme}"\\] \\{([^}]*)\\}`).exec(text)?.[1] ?? '';
  return Object.fromEntries(
    [...block.matchAll(/--([\w-]+):\s*(#[0-9a-f]{6})/g)].map(([, name, colour]) => [name, colour]),
  );
}

/** @param {string} colour */
function luminance(colour) {
  const [r, g, b] = [1, 3, 5]
    .map((at) => Number.parseInt(colour.slice(at, at + 2), 16) / 255)
    .map((part) => (part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4));
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

/** @param {string} one @param {string} other */
function ratio(one, other) {
  const [dark, light] = [luminance(one), luminance(other)].sort((a, b) => a - b);
  return (light + 0.05) / (dark + 0.05);
}

test('the formula gives the two values that the standard itself names', () => {
  assert.equal(ratio('#000000', '#ffffff'), 21);
  assert.equal(ratio('#777777', '#777777'), 1);
});

for (const theme of ['light', 'dark', 'contrast']) {
  test(`in the ${theme} theme text has 7 to 1 and every edge 3 to 1`, () => {
    const of = tokens(theme);
    const grounds = ['paper', 'leaf', 'wash'];
    const pairs = [
      ...['ink', 'ink-2', 'copper', 'patina'].flatMap((name) => grounds.map((ground) => [name, ground, 7])),
      ['ink', 'caution-wash', 7],
      ['ink', 'wrong-wash', 7],
      ['copper', 'caution-wash', 4.5],
      ['copper', 'wrong-wash', 4.5],
      ...['paper', 'leaf', 'wrong-wash'].map((ground) => ['wrong', ground, 7]),
      ['on-copper', 'copper', 7],
      ['paper', 'ink', 7],
      ...['edge', 'copper-line', 'patina-line'].flatMap((name) => grounds.map((ground) => [name, ground, 3])),
    ];
    for (const [name, ground, least] of pairs) {
      const found = ratio(of[name], of[ground]);
      assert.ok(found >= least, `${name} on ${ground}: ${found.toFixed(2)}, at least ${least}`);
    }
  });
}

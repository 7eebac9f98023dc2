// What the screens may not hold, and what must be in step.

import assert from 'node:assert/strict';
import { readdirSync, readFileSync } from 'node:fs';
import { test } from 'node:test';
import { typesFrom } from '../tools/types.mjs';

const ui = new URL('../../ui/', import.meta.url);
const texts = readdirSync(ui, { recursive: true })
  .map(String)
  .filter((name) => /\.(js|css|html|svg)$/.test(name))
  .map((name) => ({ name, text: readFileSync(new URL(name, ui), 'utf8') }));

test('nothing reads text as markup or as program, and nothing leads off the device', () => {
  assert.ok(texts.length > 30, 'the screens were found');
  const forbidden = [
    /innerHTML|outerHTML|insertAdjacentHTML|document\.write/,
    /\beval\b|new Function|\bimport\(['"`]?[^'"`.]/,
    /https?:/,
    /XMLHttpRequest|WebSocket|sendBeacon|EventSource/,
  ];
  for (const { name, text } of texts) {
    // The names of XML's own spaces look like addresses and are none.
    const rest = text.replaceAll(/http:\/\/www\.w3\.org\/2000\/svg/g, '');
    for (const pattern of forbidden) assert.doesNotMatch(rest, pattern, name);
  }
});

test('the page has no style or script of its own, so the content policy can stay strict', () => {
  for (const { name, text } of texts.filter((one) => one.name.endsWith('.html'))) {
    assert.doesNotMatch(text, /\sstyle=|<style|\son[a-z]+=|javascript:/i, name);
    assert.doesNotMatch(text, /<script(?![^>]*\ssrc=)/i, name);
  }
  for (const { name, text } of texts.filter((one) => one.name.endsWith('.js'))) {
    assert.doesNotMatch(text, /\.style\b|setAttribute\('style'|\bstyle:/, name);
  }
});

test('only api.js knows the window and the server', () => {
  for (const { name, text } of texts.filter((one) => one.name.endsWith('.js') && one.name !== 'api.js')) {
    assert.doesNotMatch(text, /__TAURI__|fetch\(/, name);
  }
});

test('every module and every stylesheet that is named is there, and every stylesheet is on the page', () => {
  const names = new Set(texts.map((one) => one.name));
  for (const { name, text } of texts.filter((one) => one.name.endsWith('.js'))) {
    for (const [, path] of text.matchAll(/from '(\.[^']+)'/g)) {
      const target = new URL(path, new URL(name, ui)).href.slice(ui.href.length);
      assert.ok(names.has(target), `${name} names ${path}`);
    }
  }
  const page = texts.find((one) => one.name === 'index.html')?.text ?? '';
  for (const name of names) if (name.endsWith('.css')) assert.ok(page.includes(`href="${name}"`), name);
});

test('the page that tells of an old engine is written in words that an old engine knows', () => {
  const text = texts.find((one) => one.name === 'old.js')?.text ?? '';
  assert.ok(text.length > 0);
  assert.doesNotMatch(text, /=>|`|\?\.|\?\?|\b(let|const|class|async)\b/);
});

test('the types are those of the schema', () => {
  const schema = JSON.parse(readFileSync(new URL('../../docs/desk.schema.json', import.meta.url), 'utf8'));
  const types = readFileSync(new URL('../types.d.ts', import.meta.url), 'utf8');
  assert.equal(types, typesFrom(schema), 'run: npm --prefix ui-dev run types');
});

import assert from 'node:assert/strict';
import { test } from 'node:test';
import { address, placeOf, readRoute, tabOf } from '../../ui/lib/route.js';

test('an address leads to its screen with what it names', () => {
  assert.deepEqual(readRoute(''), { name: 'home' });
  assert.deepEqual(readRoute('#/'), { name: 'home' });
  assert.deepEqual(readRoute('#/check/air_heat?site=s1&visit=v1'), {
    name: 'check',
    check: 'air_heat',
    site: 's1',
    visit: 'v1',
  });
  assert.deepEqual(readRoute('#/draft/d1'), { name: 'check', draft: 'd1' });
  assert.deepEqual(readRoute('#/sites/new'), { name: 'site-edit' });
  assert.deepEqual(readRoute('#/site/new'), { name: 'site', site: 'new' });
  assert.deepEqual(readRoute('#/site/s1/equipment/new'), { name: 'equipment-edit', site: 's1' });
});

test('an address that names nothing leads to the first screen', () => {
  for (const hash of ['#/nowhere', '#/site', '#/site//edit', '#/site/s1/edit/more', '#main', '#/site/%E0%A4%A']) {
    assert.deepEqual(readRoute(hash), { name: 'home' }, hash);
  }
});

test('nothing behind ? can change which screen it is or what the path names', () => {
  assert.deepEqual(readRoute('#/site/s1?name=about&site=s2'), { name: 'site', site: 's1' });
});

test('what is written is read back, whatever the names hold', () => {
  const id = 'a/b ?#%é';
  assert.deepEqual(readRoute(address(['entry', id])), { name: 'entry', entry: id });
  assert.deepEqual(readRoute(address(['checks'], { site: id, equipment: undefined, visit: null })), {
    name: 'checks',
    site: id,
  });
});

test('a place is carried along', () => {
  assert.deepEqual(placeOf(readRoute('#/checks?site=s1&visit=v1')), { site: 's1', visit: 'v1' });
  assert.deepEqual(placeOf(readRoute('#/checks')), {});
});

test('every screen below a tab marks it', () => {
  assert.equal(tabOf(readRoute('#/draft/d1')), 'checks');
  assert.equal(tabOf(readRoute('#/entry/e1')), 'sites');
  assert.equal(tabOf(readRoute('#/units')), 'units');
  assert.equal(tabOf(readRoute('#/')), 'home');
});

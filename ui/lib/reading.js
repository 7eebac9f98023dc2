// Changes of what is said beside a reading: its probe, its place, its takes. Everything here returns a new form.

/**
 * A reading with something more said of it.
 * @param {Desk.Typed} typed
 * @param {string} key
 * @param {Partial<Desk.TypedReading>} said
 * @param {string} unit the unit that stands beside it, held with it from now on
 * @returns {Desk.Typed}
 */
export function said(typed, key, said, unit) {
  const old = typed.readings?.[key] ?? { text: '' };
  return { ...typed, readings: { ...typed.readings, [key]: { ...old, unit: old.unit ?? unit, ...said } } };
}

/**
 * One more take, stamped with its time.
 * @param {Desk.Typed} typed
 * @param {string} key
 * @param {string} text
 * @param {string} unit
 * @param {string} at as `2026-12-01T14:05:20Z`
 */
export function take(typed, key, text, unit, at) {
  const takes = [...(typed.readings?.[key]?.takes ?? []), { text, at }];
  return said(typed, key, { takes }, unit);
}

/**
 * Without one of its takes.
 * @param {Desk.Typed} typed
 * @param {string} key
 * @param {number} index
 * @param {string} unit
 */
export function withoutTake(typed, key, index, unit) {
  const takes = (typed.readings?.[key]?.takes ?? []).filter((_, at) => at !== index);
  return said(typed, key, { takes }, unit);
}

/**
 * With a requirement put in, or in the place of the one at `index`.
 * @param {Desk.Typed} typed
 * @param {Desk.TypedRequirement} requirement
 * @param {number | null} index
 * @returns {Desk.Typed}
 */
export function asked(typed, requirement, index) {
  const requirements = [...(typed.requirements ?? [])];
  if (index === null) requirements.push(requirement);
  else requirements[index] = requirement;
  return { ...typed, requirements };
}

/**
 * Without the requirement at `index`.
 * @param {Desk.Typed} typed
 * @param {number} index
 * @returns {Desk.Typed}
 */
export function unasked(typed, index) {
  return { ...typed, requirements: (typed.requirements ?? []).filter((_, at) => at !== index) };
}

/**
 * A take as it was typed, with the unit beside it unless it carries one of its own.
 * @param {string} text
 * @param {string} unit
 */
export function takeText(text, unit) {
  return /^[\s\d.,'+\-\u2212\u00a0\u2009\u202f]*$/.test(text) ? `${text}\u00a0${unit}` : text;
}

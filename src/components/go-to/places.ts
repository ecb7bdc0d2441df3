import { type RouteRecordNormalized } from 'vue-router';
import { type MyWork } from '@shared/contract/work';
import { sectionsByRole } from '@/layouts/sections';
import { type Role } from '@/stores/session';

export interface Place {
  key: string;
  kind: 'act' | 'page' | 'found';
  label: string;
  detail: string;
  to: string;
}

/** Pages that this role may open without naming a record, in the order of the bar. Those at '/new' are acts. */
export function placesOf(
  routes: readonly RouteRecordNormalized[],
  role: Role,
  titleOf: (key: string) => string,
): Place[] {
  const rank = ({ name }: RouteRecordNormalized) => {
    const at = sectionsByRole[role].indexOf(String(name));
    return at < 0 ? Infinity : at;
  };
  return [...routes]
    .sort((one, other) => (rank(one) < rank(other) ? -1 : 1))
    .filter(({ path, meta, name }) => {
      if (path.includes(':') || meta.layout || !meta.title || name === 'missing') return false;
      if (meta.roles === 'anyone') return name === 'keys';
      return meta.roles === undefined || meta.roles.includes(role);
    })
    .map(({ path, meta }) => ({
      key: path,
      kind: path.endsWith('/new') ? 'act' : 'page',
      label: titleOf(meta.title!),
      detail: '',
      to: path,
    }));
}

/** What waits for this person on a lot, as an act that can be gone to. */
export function actsOf(work: MyWork | undefined): Place[] {
  const lots = (work?.sections ?? []).flatMap((section) => section.lots);
  return lots
    .filter(({ next }) => next.mine)
    .map(({ id, lotNumber, next, part }) => ({
      key: `act-${id}`,
      kind: 'act',
      label: `${lotNumber}: ${next.text}`,
      detail: part.partNumber,
      to: `/lots/${id}`,
    }));
}

/** Every word typed must occur; what begins with the text comes first. */
export function matching(places: readonly Place[], typed: string): Place[] {
  const words = typed.trim().toLowerCase().split(/\s+/);
  const text = ({ label, detail }: Place) => `${label} ${detail}`.toLowerCase();
  const starts = (place: Place) => Number(text(place).startsWith(words.join(' ')));
  return places
    .filter((place) => words.every((word) => text(place).includes(word)))
    .sort((one, other) => starts(other) - starts(one));
}

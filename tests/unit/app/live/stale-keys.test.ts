import { describe, expect, it } from 'vitest';
import { StaleKeys } from '@/app/_components/live/stale-keys';

/** Stale keys with a hand-turned clock and fetches that end when told. */
function desk() {
  const fetching = new Set<string>();
  const fetched: string[] = [];
  const due: (() => void)[] = [];
  const keys = new StaleKeys({
    isFetching: ([name]) => fetching.has(String(name)),
    invalidate: ([name]) => {
      fetched.push(String(name));
      fetching.add(String(name));
    },
    later: (run) => void due.push(run),
  });
  return { keys, fetched, fetching, due, tick: () => due.splice(0).forEach((run) => run()) };
}

describe('StaleKeys', () => {
  it('fetches a key once for the events of one moment', () => {
    const { keys, fetched, tick } = desk();
    keys.add([['docket'], ['revision']]);
    keys.add([['docket']]);
    tick();
    expect(fetched).toEqual(['docket', 'revision']);
  });

  it('never cuts a fetch short, and fetches once more when it has ended', () => {
    const { keys, fetched, fetching, tick } = desk();
    keys.add([['docket']]);
    tick();
    for (let event = 0; event < 20; event++) {
      keys.add([['docket']]);
      tick();
    }
    expect(fetched).toEqual(['docket']);
    fetching.delete('docket');
    tick();
    expect(fetched).toEqual(['docket', 'docket']);
  });

  it('comes to rest when nothing waits', () => {
    const { keys, due, tick } = desk();
    keys.add([['docket']]);
    tick();
    expect(due).toEqual([]);
  });
});

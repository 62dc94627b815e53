import { describe, expect, test } from 'vitest';
import { bareKeysOf, changesOf } from '@/lib/audit/changes-of';

const key = '4078c5ad-b365-4ccc-a963-754e170ba691';
const shown = (image: Record<string, unknown>, names?: ReadonlyMap<string, string>) => changesOf(null, image, names).map(({ label, after }) => [label, after]);

describe('keys in the trail', () => {
  test('are said by the code of what they name', () => {
    expect(shown({ eligibility_confirmed_by: key }, new Map([[key, 'R-01']]))).toEqual([['eligibility confirmed by', 'R-01']]);
    expect(shown({ handedOver: key }, new Map([[key, 'screening of NM-0042']]))).toEqual([['handed over for', 'screening of NM-0042']]);
  });

  test('that have no code are not printed', () => {
    expect(JSON.stringify(shown({ handedOver: key, verified_by: key }))).not.toContain(key);
  });

  test('are looked up where a reader would see them', () => {
    expect(bareKeysOf({ id: key, visit_id: key, client_key: key }, null)).toEqual([]);
    expect(bareKeysOf({ verified_by: key, text: 'words' }, { verified_by: null })).toEqual([key]);
  });
});

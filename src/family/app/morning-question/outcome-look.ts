import type { OutcomeKind } from '../../../../shared/contracts/family-morning';

export interface OutcomeLook {
  slab: 'come' | 'wait' | 'phone' | 'danger';
  picture: string;
  /** The rest of the night path follows: the family is on its way. */
  showsPath: boolean;
  /** A telephone button that is as large as the sentence. */
  calls: 'clinic' | 'emergency' | null;
}

const looks: Record<OutcomeKind, OutcomeLook> = {
  come: { slab: 'come', picture: 'arrive', showsPath: true, calls: null },
  'come-and-wait': { slab: 'wait', picture: 'wait', showsPath: true, calls: null },
  'come-nurse-decides': { slab: 'wait', picture: 'nurse', showsPath: true, calls: null },
  'late-noted': { slab: 'wait', picture: 'late', showsPath: true, calls: null },
  'call-us': { slab: 'phone', picture: 'call-us', showsPath: false, calls: 'clinic' },
  'stay-we-call': { slab: 'phone', picture: 'home', showsPath: false, calls: 'clinic' },
  'feed-now-and-call': { slab: 'wait', picture: 'feed-again', showsPath: false, calls: 'clinic' },
  'food-first': { slab: 'phone', picture: 'feed-again', showsPath: false, calls: 'clinic' },
  emergency: { slab: 'danger', picture: 'emergency', showsPath: false, calls: 'emergency' },
  'not-coming': { slab: 'phone', picture: 'home', showsPath: false, calls: null },
};

/** An outcome that this application does not know yet leads to the telephone, never to 'come'. */
export function outcomeLook(kind: OutcomeKind): OutcomeLook {
  return looks[kind] ?? looks['call-us'];
}

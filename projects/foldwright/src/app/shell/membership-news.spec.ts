import { membershipNews } from './membership-news';

const LARKFIELD = { workshopId: 'a', workshopName: 'Larkfield Cartworks', role: 'fabricator' } as const;
const ORCHARD = { workshopId: 'b', workshopName: 'Orchard Street Welding', role: 'owner' } as const;

describe('news about a membership', () => {
  it('are none when nothing changed, when somebody switched in another tab, and for who was in no workshop', () => {
    expect(membershipNews(LARKFIELD, LARKFIELD, [LARKFIELD, ORCHARD])).toBeNull();
    expect(membershipNews(LARKFIELD, ORCHARD, [LARKFIELD, ORCHARD])).toBeNull();
    expect(membershipNews(null, ORCHARD, [ORCHARD])).toBeNull();
  });

  it('tell of another role', () => {
    const now = { ...LARKFIELD, role: 'viewer' } as const;
    expect(membershipNews(LARKFIELD, now, [now])?.title).toBe('You are viewer in Larkfield Cartworks now');
  });

  it('tell of a workshop that was lost, and where the person is now', () => {
    expect(membershipNews(LARKFIELD, ORCHARD, [ORCHARD])).toEqual({
      title: 'You no longer belong to Larkfield Cartworks',
      detail: 'You work in Orchard Street Welding now.',
    });
    expect(membershipNews(LARKFIELD, null, [])?.detail).toBe('An owner can invite you again.');
  });
});

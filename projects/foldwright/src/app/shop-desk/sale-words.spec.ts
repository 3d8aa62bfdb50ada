import { nextStep } from './sale-words';

describe('what to do next with a sale', () => {
  it('puts a question first, then what is missing, then the parcel', () => {
    expect(nextStep({ state: 'paid', short: 2, unanswered: 1 })).toBe('answer a question');
    expect(nextStep({ state: 'paid', short: 2, unanswered: 0 })).toBe('2 to be cut');
    expect(nextStep({ state: 'partly-shipped', short: 0, unanswered: 0 })).toBe('send it');
    expect(nextStep({ state: 'shipped', short: 0, unanswered: 0 })).toBeNull();
    expect(nextStep({ state: 'placed', short: 1, unanswered: 0 })).toBeNull();
  });
});

import { HttpErrorResponse } from '@angular/common/http';
import { TestBed } from '@angular/core/testing';
import { Notices } from './notices';
import { OnceCall } from './once-call';

describe('OnceCall', () => {
  const showProblem = jest.fn();
  const make = () => {
    TestBed.configureTestingModule({ providers: [{ provide: Notices, useValue: { showProblem } }] });
    return TestBed.runInInjectionContext(() => new OnceCall());
  };
  const answerWith = (status: number) => (key: string) => {
    used.push(key);
    return Promise.reject(new HttpErrorResponse({ status, url: '/api/x' }));
  };
  let used: string[];
  beforeEach(() => {
    used = [];
    showProblem.mockClear();
  });

  it('tries again under the same key while nobody knows what became of the first try', async () => {
    const call = make();
    await call.run(answerWith(0));
    await call.run(answerWith(502));
    expect(await call.run((key) => Promise.resolve(used.push(key)))).toBe(3);
    expect(new Set(used).size).toBe(1);
    expect(showProblem).toHaveBeenCalledTimes(2);
  });

  it('makes a new key after a definite answer', async () => {
    const call = make();
    await call.run((key) => Promise.resolve(used.push(key)));
    await call.run(answerWith(409));
    await call.run((key) => Promise.resolve(used.push(key)));
    expect(new Set(used).size).toBe(3);
  });

  it('does one thing at a time', async () => {
    const call = make();
    let finish = (): void => undefined;
    const first = call.run(() => new Promise<string>((done) => (finish = () => done('first'))));
    expect(call.isBusy()).toBe(true);
    expect(await call.run(() => Promise.resolve('second'))).toBeUndefined();
    finish();
    expect(await first).toBe('first');
    expect(call.isBusy()).toBe(false);
  });
});

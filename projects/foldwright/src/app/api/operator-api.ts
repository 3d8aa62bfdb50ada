import { Injectable, inject } from '@angular/core';
import { readTroubles, replayMessage, retryWork, sendMailAgain } from '@foldwright/shared/contracts/operator';
import type { RouteResponse } from '@foldwright/shared/contracts/route';
import { ApiClient, type ApiRead } from './api-client';

export type Troubles = RouteResponse<typeof readTroubles>;

/** What did not go through in this installation, and the ways to try it again. */
@Injectable({ providedIn: 'root' })
export class OperatorApi {
  private readonly client = inject(ApiClient);

  troubles(): ApiRead<Troubles> {
    return this.client.read(readTroubles, () => ({}));
  }

  async retryWork(queue: string, workId: string): Promise<void> {
    await this.client.call(retryWork, { params: { queue, workId } });
  }

  async replay(messageId: string): Promise<void> {
    await this.client.call(replayMessage, { params: { messageId } });
  }

  async sendAgain(mailId: string): Promise<void> {
    await this.client.call(sendMailAgain, { params: { mailId } });
  }
}

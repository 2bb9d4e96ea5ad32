import { Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import type { Watch } from '@kerfyard/common/realtime';

export type MayWatch = (actor: Actor, id: string) => Promise<boolean>;

/** Who may hear about which scope, subcontract or thread: the feature that owns the topic says so. */
@Injectable()
export class WatchAccess {
  private readonly rules = new Map<Watch['topic'], MayWatch>();

  /** Once per topic, when the feature's module starts. */
  register(topic: Watch['topic'], mayWatch: MayWatch): void {
    if (this.rules.has(topic)) throw new Error(`two rules for watching a ${topic}`);
    this.rules.set(topic, mayWatch);
  }

  /** A topic without a rule is heard by nobody. */
  async allows(actor: Actor, watch: Watch): Promise<boolean> {
    const mayWatch = this.rules.get(watch.topic);
    return mayWatch !== undefined && (await mayWatch(actor, watch.id));
  }
}

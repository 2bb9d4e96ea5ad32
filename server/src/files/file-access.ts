import { Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';

/** Whether a person of another company may read a file because of where it is shown. */
export type FileAccessRule = (actor: Actor, fileId: string) => Promise<boolean>;

/**
 * Who may read which file. People always read their own company's; every feature that shows files to others registers
 * its rule here when its module starts. Nothing registered means nobody else.
 */
@Injectable()
export class FileAccess {
  private readonly rules: FileAccessRule[] = [];

  register(rule: FileAccessRule): void {
    this.rules.push(rule);
  }

  async mayRead(actor: Actor, file: { id: string; companyId: string }): Promise<boolean> {
    if (actor.company?.id === file.companyId) return true;
    for (const rule of this.rules) {
      if (await rule(actor, file.id)) return true;
    }
    return false;
  }
}

import { DefaultNamingStrategy } from 'typeorm';

/** Columns are named as SQL names them: `addedAt` is stored as `added_at`. */
export class SnakeNaming extends DefaultNamingStrategy {
  override columnName(property: string, custom: string | undefined): string {
    return custom ?? property.replace(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`);
  }
}

import { DefaultNamingStrategy } from 'typeorm';

/** camelCase in TypeScript, snake_case in PostgreSQL. */
export function snakeCase(name: string): string {
  return name.replace(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`);
}

export class SnakeNaming extends DefaultNamingStrategy {
  override columnName(propertyName: string, customName: string | undefined): string {
    return customName ?? snakeCase(propertyName);
  }
}

import { DefaultNamingStrategy, type NamingStrategyInterface } from 'typeorm';

const snakeCase = (name: string): string => name.replace(/([a-z0-9])([A-Z])/g, '$1_$2').toLowerCase();

/** camelCase properties, snake_case columns: plain SQL stays readable without quotes. */
export class SnakeNamingStrategy extends DefaultNamingStrategy implements NamingStrategyInterface {
  override columnName(propertyName: string, customName: string | undefined, embeddedPrefixes: string[]): string {
    return [...embeddedPrefixes, customName ?? snakeCase(propertyName)].map(snakeCase).join('_');
  }
}

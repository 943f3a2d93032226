import { Injectable, ValidationPipe, type ArgumentMetadata, type ValidationError } from '@nestjs/common';
import { AppError } from './app-error';

const FORBIDDEN_KEYS = new Set(['__proto__', 'constructor', 'prototype']);
const DEPTH_MAX = 20;

/** The first thing in a value that no field may hold, as [path, message]; undefined when there is none. */
function findForbidden(value: unknown, path: string, depth = 0): [string, string] | undefined {
  if (typeof value === 'string') {
    return value.includes('\0') ? [path, 'must not contain the character U+0000'] : undefined;
  }
  if (typeof value !== 'object' || value === null || Buffer.isBuffer(value)) return undefined;
  if (depth > DEPTH_MAX) return [path, 'is nested too deeply'];
  for (const [key, inner] of Object.entries(value)) {
    const at = path === '' ? key : `${path}.${key}`;
    if (FORBIDDEN_KEYS.has(key) || key.includes('\0')) return [at, 'is not a field'];
    const found = findForbidden(inner, at, depth + 1);
    if (found) return found;
  }
  return undefined;
}

function collectFields(errors: readonly ValidationError[], parent = ''): Record<string, string[]> {
  const fields: Record<string, string[]> = {};
  for (const { property, constraints, children } of errors) {
    const path = parent === '' ? property : `${parent}.${property}`;
    if (constraints) fields[path] = Object.values(constraints);
    Object.assign(fields, collectFields(children ?? [], path));
  }
  return fields;
}

/** Checks bodies, queries and parameters against their DTO; unknown fields and NUL characters are refused. */
@Injectable()
export class AppValidationPipe extends ValidationPipe {
  constructor() {
    super({
      whitelist: true,
      forbidNonWhitelisted: true,
      forbidUnknownValues: true,
      transform: true,
      stopAtFirstError: false,
      validationError: { target: false, value: false },
      exceptionFactory: (errors) => new AppError('VALIDATION_FAILED', { fields: collectFields(errors) }),
    });
  }

  override transform(value: unknown, metadata: ArgumentMetadata): Promise<unknown> {
    if (metadata.type !== 'custom') {
      const found = findForbidden(value, metadata.data ?? '');
      if (found) throw new AppError('VALIDATION_FAILED', { fields: { [found[0]]: [found[1]] } });
    }
    return super.transform(value, metadata) as Promise<unknown>;
  }
}

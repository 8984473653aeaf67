/** What does not change while the program runs: fields of the recipe, looks of the causes, colours of the value scale. */
import { z } from 'zod';
import { kernelsInstalled } from '../src/kernels/installed.ts';
import { causes } from '../src/ledger/ledger.ts';
import { defaultRecipe } from '../src/recipe/parse-recipe.ts';
import { sections } from '../src/recipe/recipe.ts';
import { appearanceByCode, hatchPath, hatchPeriod } from '../src/report/appearance.ts';
import type { App } from '../src/report/appraised.ts';
import { cividis, cividisLength } from '../src/report/cividis.ts';
import type { ComputeFacts, FieldInfo, RecipeData } from './api.ts';

export function factsOf(app: App): ComputeFacts {
  return {
    app: { name: app.name, version: app.version },
    causes: causes.map((cause, code) => {
      const { fill, ink, hatch } = appearanceByCode[code]!;
      const { d, strokeWidth } = hatchPath[hatch];
      return { code, cause, fill, ink, hatch, hatchPath: d, hatchStroke: strokeWidth ?? 0 };
    }),
    hatchPeriod,
    kernels: kernelsInstalled(),
    fields: Object.entries(sections).flatMap(([name, schema]) => fieldsOf(name, schema)),
    defaultRecipe: JSON.parse(JSON.stringify(defaultRecipe())) as RecipeData,
    scale: Array.from({ length: cividisLength }, (_, index) => `#${cividis(index).map((channel) => channel.toString(16).padStart(2, '0')).join('')}`),
  };
}

/** A field as zod's JSON Schema of it says; the metadata travel in it. */
interface JsonField {
  readonly type?: string;
  readonly title?: string;
  readonly description?: string;
  readonly unit?: string;
  readonly absent?: string;
  readonly default?: number | string | boolean;
  readonly minimum?: number;
  readonly exclusiveMinimum?: number;
  readonly maximum?: number;
  readonly enum?: readonly string[];
}

/** One entry per number, choice, flag or word of a section. Lists (alignment marks) have no single value to show and are left out. */
function fieldsOf(section: string, schema: z.ZodType): FieldInfo[] {
  const { properties } = z.toJSONSchema(schema, { io: 'input' });
  return Object.entries((properties ?? {}) as Readonly<Record<string, JsonField>>).flatMap(([key, field]): FieldInfo[] => {
    const kind = kindOf(field);
    if (!kind) return [];
    const min = bound(field.minimum ?? field.exclusiveMinimum);
    const max = bound(field.maximum);
    return [{
      path: `${section}.${key}`, kind, title: field.title ?? key, description: field.description ?? '',
      ...(field.unit === undefined ? {} : { unit: field.unit }),
      ...(min === undefined ? {} : { min }),
      ...(max === undefined ? {} : { max }),
      ...(field.type === 'integer' ? { integer: true } : {}),
      ...(field.enum === undefined ? {} : { choices: field.enum }),
      ...(field.default === undefined ? {} : { fallback: field.default }),
      ...(field.absent === undefined ? {} : { absent: field.absent }),
    }];
  });
}

function kindOf(field: JsonField): FieldInfo['kind'] | undefined {
  if (field.enum) return 'choice';
  switch (field.type) {
    case 'number': case 'integer': return 'number';
    case 'boolean': return 'flag';
    case 'string': return 'word';
    default: return undefined;
  }
}

/** Whole numbers carry the largest exact integer as a bound of their type, which is no bound of the field's. */
function bound(value: number | undefined): number | undefined {
  return value === undefined || Math.abs(value) >= Number.MAX_SAFE_INTEGER ? undefined : value;
}

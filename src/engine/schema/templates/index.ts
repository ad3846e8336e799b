/** The door of the templates. */
export { applyTemplate, TEMPLATES, templateNamed, type AnyTemplate } from './table';
export { isFieldShown } from './shown-fields';
export { rewriteUntouched } from './rewrite';
export type { Template, TemplateField, TemplateOutcome, TemplateProblem } from './contract';

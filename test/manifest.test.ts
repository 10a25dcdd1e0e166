// The program refuses a manifest that breaks one of its rules without saying which. Its schema is not to be had offline, so the rules
// that matter are held here.

import { readFileSync } from 'node:fs';
import path from 'node:path';
import ts from 'typescript';
import { describe, expect, it } from 'vitest';
import { manifestFor, siteAddress } from '../manifest/manifest-for.js';
import { NAMESPACE } from '../src/host/sheet/functions-runtime';
import { dist, siteFile } from './support/browser';
import { pngSize } from './support/png';
import { type Element, elements, parseXml } from './support/xml';

const BASE = 'https://localhost:3000';
const built = readFileSync(path.join(dist, 'manifest.xml'), 'utf8');
const manifest = parseXml(built);

describe('the manifest', () => {
  it('has its parts in the order that the schema wants', () => {
    expect([manifest.name, manifest.attributes['xsi:type']]).toEqual(['OfficeApp', 'TaskPaneApp']);
    expect(manifest.children.map(({ name }) => name)).toEqual([
      'Id', 'Version', 'ProviderName', 'DefaultLocale', 'DisplayName', 'Description', 'IconUrl', 'HighResolutionIconUrl', 'SupportUrl',
      'Hosts', 'Requirements', 'DefaultSettings', 'Permissions', 'VersionOverrides',
    ]);
    expect(only('VersionOverrides').children.map(({ name }) => name)).toEqual(['Hosts', 'Resources']);
    expect(only('DesktopFormFactor').children.map(({ name }) => name)).toEqual(['GetStarted', 'FunctionFile', 'ExtensionPoint']);
    expect(only('Resources').children.map(({ name }) => name)).toEqual(['bt:Images', 'bt:Urls', 'bt:ShortStrings', 'bt:LongStrings']);
  });

  it('says who it is: an id of its own, the version of the package in four numbers, brief texts', () => {
    const { version } = JSON.parse(readFileSync(path.join(import.meta.dirname, '../package.json'), 'utf8')) as { version: string };
    expect(only('Id').text).toMatch(/^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/);
    expect(only('Version').text).toBe(`${version}.0`);
    expect(only('Version').text).toMatch(/^\d+(\.\d+){3}$/);
    expect(only('DisplayName').attributes.DefaultValue!.length).toBeLessThanOrEqual(125);
    expect(manifest.children.find(({ name }) => name === 'Description')!.attributes.DefaultValue!.length).toBeLessThanOrEqual(250);
  });

  it('asks for a workbook that it may write to, in one program, and trusts no other site', () => {
    expect(manifest.children.find(({ name }) => name === 'Hosts')!.children.map(({ attributes }) => attributes.Name)).toEqual(['Workbook']);
    expect(only('Permissions').text).toBe('ReadWriteDocument');
    expect(all('AppDomain')).toEqual([]);
  });

  it('runs the pane, the functions and the commands in one page that lives on', () => {
    const { resid, lifetime } = only('Runtime').attributes;
    const location = (part: Element) => part.children.find(({ name }) => name === 'SourceLocation')!.attributes.resid;
    expect(lifetime).toBe('long');
    expect([location(only('Page')), only('FunctionFile').attributes.resid, location(only('Action'))]).toEqual([resid, resid, resid]);
    expect(all('TaskpaneId')).toEqual([]);
    expect(resource(resid!)).toBe(only('DefaultSettings').children[0]!.attributes.DefaultValue);
  });

  it('names the namespace that formulas use, and the files of the functions', () => {
    const location = (part: string) => resource(only(part).children[0]!.attributes.resid!);
    expect(resource(only('Namespace').attributes.resid!)).toBe(NAMESPACE);
    expect([location('Script'), location('Metadata')]).toEqual([`${BASE}/functions.js`, `${BASE}/functions.json`]);
  });

  it('uses every resource that it defines, and defines every one that it uses, once', () => {
    const defined = only('Resources').children.flatMap(({ children }) => children.map(({ attributes }) => attributes.id!));
    const used = elements(manifest).flatMap(({ attributes }) => (attributes.resid === undefined ? [] : [attributes.resid]));
    expect(new Set(defined).size).toBe(defined.length);
    expect([...new Set(used)].toSorted()).toEqual(defined.toSorted());
  });

  it('keeps ids and texts within the lengths that the program takes', () => {
    for (const { attributes: { id } } of elements(only('Resources')).filter(({ attributes }) => attributes.id)) expect(id!.length, id).toBeLessThanOrEqual(32);
    const longest = (part: string) => Math.max(...only(part).children.map(({ attributes }) => attributes.DefaultValue!.length));
    expect(longest('bt:ShortStrings')).toBeLessThanOrEqual(125);
    expect(longest('bt:LongStrings')).toBeLessThanOrEqual(250);
    const controls = elements(manifest).filter(({ name }) => name === 'Group' || name === 'Control').map(({ attributes }) => attributes.id!);
    expect(new Set(controls).size).toBe(controls.length);
    for (const id of controls) expect(id.length, id).toBeLessThanOrEqual(125);
  });

  it('has all its addresses on the site, and the site holds what they name', () => {
    const addresses = addressesOf(manifest);
    expect(addresses.length).toBeGreaterThan(10);
    for (const address of addresses) {
      expect(address.startsWith(`${BASE}/`), address).toBe(true);
      expect(siteFile(address.slice(BASE.length)), address).not.toBeNull();
    }
  });

  it('follows the site to another address', () => {
    const base = 'https://plan.example/tools/foldplan';
    const moved = addressesOf(parseXml(manifestFor(base, '1.2.3')));
    expect(moved).toEqual(addressesOf(manifest).map((address) => address.replace(BASE, base)));
    expect(manifestFor(base, '1.2.3')).not.toMatch(/\{\{|localhost/);
  });

  it('is made for an https address alone', () => {
    expect(['https://tools.example/foldplan/', 'https://tools.example:8443'].map(siteAddress)).toEqual(['https://tools.example/foldplan', 'https://tools.example:8443']);
    for (const text of ['tools.example', 'http://tools.example', 'https://tools.example/?a=1', 'https://me@tools.example', 'https://tools.example/a&b', '']) {
      expect(() => siteAddress(text), text).toThrow(`base must be the https address of a site, such as https://tools.example/foldplan; got ${text}`);
    }
  });

  it('shows icons in the sizes that it says, those that the program insists on among them', () => {
    for (const icon of all('Icon')) {
      const sizes = icon.children.map(({ attributes }) => Number(attributes.size));
      expect(sizes).toEqual(expect.arrayContaining([16, 32, 80]));
      for (const { attributes: { size, resid } } of icon.children) expect(sizeOf(resource(resid!)), resid).toEqual([Number(size), Number(size)]);
    }
    expect(sizeOf(only('IconUrl').attributes.DefaultValue!)).toEqual([32, 32]);
    expect(sizeOf(only('HighResolutionIconUrl').attributes.DefaultValue!)).toEqual([64, 64]);
  });

  it('requires the versions of the program that the code needs, and no later ones', () => {
    const required = Object.fromEntries(all('Set').map(({ attributes }) => [attributes.Name!, attributes.MinVersion!]));
    // The shared page needs its set without calling anything of it.
    expect(required).toEqual({ ...setsCalled(['src/main-office.ts', 'src/functions/index.ts']), SharedRuntime: '1.1' });
  });
});

function all(name: string): Element[] {
  return elements(manifest).filter((element) => element.name === name);
}

function only(name: string): Element {
  const found = all(name);
  expect(found.length, name).toBe(1);
  return found[0]!;
}

function resource(id: string): string {
  return elements(only('Resources')).find(({ attributes }) => attributes.id === id)!.attributes.DefaultValue!;
}

function addressesOf(within: Element): string[] {
  return elements(within).map(({ attributes }) => attributes.DefaultValue ?? '').filter((value) => /^\w+:\/\//.test(value));
}

const sizeOf = (address: string) => pngSize(siteFile(address.slice(BASE.length))!.body);

/**
 * The latest set of each kind that the code needs: every member of the vendor's libraries is declared with its own. A file that asks the
 * program for a later set can do without it.
 */
function setsCalled(entries: string[]): Record<string, string> {
  const root = path.join(import.meta.dirname, '..');
  const { config } = ts.readConfigFile(path.join(root, 'tsconfig.json'), (file) => readFileSync(file, 'utf8')) as { config: object };
  const { options } = ts.parseJsonConfigFileContent(config, ts.sys, root);
  const program = ts.createProgram(entries.map((file) => path.join(root, file)), options);
  const checker = program.getTypeChecker();
  const latest: Record<string, string> = {};
  const note = (declaration: ts.Declaration, asked: Record<string, string>) => {
    if (!/@types\/(office-js|custom-functions-runtime)\//.test(declaration.getSourceFile().fileName)) return;
    const [, set, version] = /\[Api set: (\w+) ([\d.]+)\]/.exec(declaration.getFullText().slice(0, declaration.getLeadingTriviaWidth())) ?? [];
    if (set && compareVersions(version!, asked[set] ?? '0') > 0 && compareVersions(version!, latest[set] ?? '0') > 0) latest[set] = version!;
  };
  const visit = (node: ts.Node, asked: Record<string, string>): void => {
    if (ts.isIdentifier(node)) checker.getSymbolAtLocation(node)?.declarations?.forEach((declaration) => note(declaration, asked));
    ts.forEachChild(node, (child) => visit(child, asked));
  };
  for (const file of program.getSourceFiles()) {
    const asked = [...file.text.matchAll(/isSetSupported\('(\w+)', '([\d.]+)'\)/g)].map(([, set, version]) => [set!, version!]);
    if (file.fileName.startsWith(path.join(root, 'src'))) visit(file, Object.fromEntries(asked));
  }
  return latest;
}

function compareVersions(one: string, other: string): number {
  const [a = 0, b = 0] = one.split('.').map(Number);
  const [c = 0, d = 0] = other.split('.').map(Number);
  return a - c || b - d;
}

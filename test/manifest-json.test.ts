// The JSON manifest says the same as the XML one, in the vendor's later form. Its schema comes with the vendor's package.

import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import path from 'node:path';
import { AppManifestUtils, type TeamsManifest } from '@microsoft/app-manifest';
import JSZip from 'jszip';
import { describe, expect, it } from 'vitest';
import { manifestFor } from '../manifest/manifest-for.js';
import { dist, siteFile } from './support/browser';
import { pngSize } from './support/png';
import { elements, parseXml } from './support/xml';

const BASE = 'https://localhost:3000';
const read = (name: string) => readFileSync(path.join(dist, name), 'utf8');

/** What the tests look at; the schema looks at the rest. */
interface Manifest {
  $schema: string;
  id: string;
  version: string;
  name: { short: string };
  description: { full: string };
  developer: { name: string };
  icons: { color: string; outline: string };
  accentColor: string;
  extensions: [{
    requirements: { scopes: string[]; capabilities: { name: string; minVersion: string }[] };
    runtimes: [{ id: string; lifetime: string; code: { page: string; script: string }; actions: { id: string; view: string }[]; customFunctions: { namespace: { id: string; name: string }; metadataUrl: string } }];
    ribbons: [{ tabs: [{ builtInTabId: string; groups: [Group] }] }];
    getStartedMessages: [{ title: string; description: string; learnMoreUrl: string }];
  }];
}

interface Group {
  id: string;
  label: string;
  icons: Icon[];
  controls: [{ id: string; label: string; icons: Icon[]; supertip: { title: string; description: string }; actionId: string }];
}

interface Icon {
  size: number;
  url: string;
}

const manifest = JSON.parse(read('manifest.json')) as Manifest;
const [extension] = manifest.extensions;
const [runtime] = extension.runtimes;
const [tab] = extension.ribbons[0].tabs;
const [group] = tab.groups;
const [button] = group.controls;

const schemaFile = createRequire(import.meta.url).resolve(`@microsoft/app-manifest/build/json-schemas/${/teams\/v[\d.]+/.exec(manifest.$schema)![0]}/MicrosoftTeams.schema.json`);
const faultsOf = (given: Manifest) => AppManifestUtils.validateAgainstSchema(given as unknown as TeamsManifest, JSON.parse(readFileSync(schemaFile, 'utf8')));

/** Texts of the manifest, with where they stand. */
const textsIn = (value: unknown): string[] => (typeof value === 'string' ? [value] : typeof value === 'object' && value !== null ? Object.values(value).flatMap(textsIn) : []);

const addressesOf = ({ $schema: _, ...rest }: Manifest) => textsIn(rest).filter((text) => /^\w+:\/\//.test(text));

describe('the JSON manifest', () => {
  it('keeps to the schema that it names', async () => {
    expect(await faultsOf(manifest)).toEqual([]);
  });

  it('would not, with mistakes in it', async () => {
    expect(await faultsOf({ ...manifest, accentColor: 'blue' })).toEqual([expect.stringContaining('/accentColor')]);
    const withoutPage = structuredClone(manifest);
    Reflect.deleteProperty(withoutPage.extensions[0].runtimes[0].code, 'page');
    expect(await faultsOf(withoutPage)).toEqual([expect.stringContaining('/extensions/0/runtimes/0/code')]);
  });

  it('says the same as the XML manifest', () => {
    const parts = elements(parseXml(read('manifest.xml')));
    const text = (name: string) => parts.find((part) => part.name === name)!.text;
    const value = (name: string) => parts.find((part) => part.name === name)!.attributes.DefaultValue;
    const resource = (id: string) => parts.find(({ attributes }) => attributes.id === id)!.attributes.DefaultValue;
    expect({
      id: manifest.id, version: `${manifest.version}.0`, name: manifest.name.short, description: manifest.description.full, author: manifest.developer.name,
      sets: Object.fromEntries(extension.requirements.capabilities.map(({ name, minVersion }) => [name, minVersion])), scopes: extension.requirements.scopes,
      page: runtime.code.page, script: runtime.code.script, metadata: runtime.customFunctions.metadataUrl, namespace: runtime.customFunctions.namespace, lifetime: runtime.lifetime,
      tab: tab.builtInTabId, group: group.label, button: button.label, tip: button.supertip, started: extension.getStartedMessages,
    }).toEqual({
      id: text('Id'), version: text('Version'), name: value('DisplayName'), description: value('Description'), author: text('ProviderName'),
      sets: Object.fromEntries(parts.filter(({ name }) => name === 'Set').map(({ attributes }) => [attributes.Name, attributes.MinVersion])), scopes: ['workbook'],
      page: resource('Pane.Url'), script: resource('Functions.Script'), metadata: resource('Functions.Metadata'),
      namespace: { id: resource('Functions.Namespace'), name: resource('Functions.Namespace') }, lifetime: parts.find(({ name }) => name === 'Runtime')!.attributes.lifetime,
      tab: parts.find(({ name }) => name === 'OfficeTab')!.attributes.id, group: resource('Group.Label'), button: resource('Button.Label'),
      tip: { title: resource('Button.Label'), description: resource('Button.Tip') },
      started: [{ title: resource('Started.Title'), description: resource('Started.Description'), learnMoreUrl: resource('Help.Url') }],
    });
  });

  it('has a button whose action there is, and ids that are there once', () => {
    expect(runtime.actions.map(({ id }) => id)).toEqual([button.actionId]);
    const ids = [runtime.id, ...runtime.actions.flatMap(({ id, view }) => [id, view]), group.id, button.id];
    expect(new Set(ids).size).toBe(ids.length);
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
    const moved = JSON.parse(manifestFor(base, '1.2.3', 'manifest.json')) as Manifest;
    expect(addressesOf(moved)).toEqual(addressesOf(manifest).map((address) => address.replace(BASE, base)));
    expect(moved.version).toBe('1.2.3');
    expect(textsIn(moved).filter((text) => /\{\{|localhost/.test(text))).toEqual([]);
  });

  it('shows icons in the sizes that it says', () => {
    for (const { size, url } of [...group.icons, ...button.icons]) expect(pngSize(siteFile(url.slice(BASE.length))!.body), url).toEqual([size, size]);
    for (const icons of [group.icons, button.icons]) expect(icons.map(({ size }) => size)).toEqual([16, 32, 80]);
    expect([manifest.icons.color, manifest.icons.outline].map((icon) => pngSize(siteFile(`/${icon}`)!.body))).toEqual([[192, 192], [32, 32]]);
    expect(readFileSync(path.join(dist, 'assets/icon.svg'), 'utf8')).toContain(manifest.accentColor);
  });

  it('is uploaded in an archive with the icons that it names', async () => {
    const archive = await JSZip.loadAsync(readFileSync(path.join(dist, 'foldplan.zip')));
    expect(Object.keys(archive.files)).toEqual(['manifest.json', manifest.icons.color, manifest.icons.outline]);
    for (const name of Object.keys(archive.files)) expect((await archive.file(name)!.async('nodebuffer')).equals(readFileSync(path.join(dist, name))), name).toBe(true);
  });
});

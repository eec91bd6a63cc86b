import { describe, expect, it } from 'vitest';
import { standardColumns } from './columns';
import { readAddress, turnOrder, writeAddress, writeQuery, type ListView } from './list-address';

const usual: ListView = { text: '', states: '', deleted: false, sort: 'number', direction: 'ascending', columns: standardColumns };

describe('the address of the list', () => {
  it('says nothing of what is as usual', () => {
    expect(writeAddress(usual).toString()).toBe('');
    expect(readAddress(new URLSearchParams(), undefined)).toEqual(usual);
  });
  it('reads back as it was written', () => {
    const view: ListView = { text: 'drum & flange', states: 'failed,unit-missing', deleted: true, sort: 'moment3', direction: 'descending', columns: ['name', 'mass'] };
    expect(readAddress(new URLSearchParams(writeAddress(view).toString()), undefined)).toEqual(view);
  });
  it('that says something wrong shows the list as usual', () => {
    expect(readAddress(new URLSearchParams('sort=colour&direction=up&states=ready,lost&columns=none&deleted=1'), undefined)).toEqual({ ...usual, states: 'ready' });
  });
  it('without columns has those that this browser had last', () => {
    expect(readAddress(new URLSearchParams(), ['name', 'file']).columns).toEqual(['name', 'file']);
    expect(readAddress(new URLSearchParams('columns=name,mass'), ['name', 'file']).columns).toEqual(['name', 'mass']);
  });
  it('is what the api is asked, less the columns', () => {
    expect(writeQuery({ ...usual, text: 'drum', columns: ['name'] } as ListView).toString()).toBe('text=drum');
  });
  it('a head that is pressed again sorts the other way round, another one from the least', () => {
    expect(turnOrder(usual, 'number')).toEqual({ sort: 'number', direction: 'descending' });
    expect(turnOrder({ sort: 'number', direction: 'descending' }, 'number')).toEqual({ sort: 'number', direction: 'ascending' });
    expect(turnOrder({ sort: 'number', direction: 'descending' }, 'mass')).toEqual({ sort: 'mass', direction: 'ascending' });
  });
});

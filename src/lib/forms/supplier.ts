import { z } from 'zod';
import { m } from '../paraglide/messages';
import { centsField, readText, versionField, wholeField, wordsField } from './fields';
import { typeCents } from '../domain/trade/money';

const email = (where: string) =>
	readText((text) => {
		const address = text.trim();
		if (/^[^\s@,;<>"]+@[^\s@,;<>"]+\.[^\s@,;<>".]+$/.test(address) && address.length <= 254)
			return { ok: true, value: address };
		const problem = { kind: 'form.email', where, received: address.slice(0, 60) };
		return {
			ok: false,
			problem: { ...problem, accepted: 'an address such as orders@metal.example' }
		};
	});

/** A supplier as a person fills it in. */
export const supplierForm = () =>
	z.object({
		name: wordsField(m.catalog_supplier_name(), 80, 1),
		email: email(m.catalog_supplier_email()),
		phone: wordsField(m.catalog_supplier_phone(), 40),
		minimumOrderCents: centsField(m.catalog_supplier_minimum()),
		freightCents: centsField(m.catalog_supplier_freight()),
		leadDays: wholeField(m.catalog_supplier_lead(), 0, 365)
	});
export const supplierEditForm = () => supplierForm().extend({ version: versionField });
export type SupplierInput = z.output<ReturnType<typeof supplierForm>>;

/** A supplier as its form shows it. */
export const supplierTexts = (of: SupplierInput) => ({
	name: of.name,
	email: of.email,
	phone: of.phone,
	minimumOrderCents: typeCents(of.minimumOrderCents),
	freightCents: typeCents(of.freightCents),
	leadDays: String(of.leadDays)
});
export const NEW_SUPPLIER: SupplierInput = {
	name: '',
	email: '',
	phone: '',
	minimumOrderCents: 0,
	freightCents: 0,
	leadDays: 0
};
export const supplierLabels = (): Readonly<Record<keyof SupplierInput, string>> => ({
	name: m.catalog_supplier_name(),
	email: m.catalog_supplier_email(),
	phone: m.catalog_supplier_phone(),
	minimumOrderCents: m.catalog_supplier_minimum(),
	freightCents: m.catalog_supplier_freight(),
	leadDays: m.catalog_supplier_lead()
});

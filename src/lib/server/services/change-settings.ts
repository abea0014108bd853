import { invariant } from '../../domain/invariant';
import type { SettingsText } from '../../forms/settings';
import type { Context } from '../context';
import { write } from '../db/client';
import type { FieldProblem } from '../http/problem';
import { appendHistory } from '../queries/history';
import { findShop, updateShopRules } from '../queries/shops';
import { LENGTH_RULES, readSettings, settingsText } from './shop-rules';

const LABELS: Record<keyof SettingsText, string> = {
	name: 'shop name',
	timeZone: 'time zone',
	units: 'units',
	jointPrice: 'price of a joint',
	liftCaution: 'lift caution',
	...(Object.fromEntries(
		Object.entries(LENGTH_RULES).map(([field, rule]) => [field, rule.label.toLowerCase()])
	) as Record<keyof typeof LENGTH_RULES, string>)
};

export interface FieldChange {
	readonly field: keyof SettingsText;
	readonly label: string;
	readonly from: string;
	readonly to: string;
}

function differences(from: SettingsText, to: SettingsText): FieldChange[] {
	return (Object.keys(LABELS) as (keyof SettingsText)[])
		.filter((field) => from[field] !== to[field])
		.map((field) => ({ field, label: LABELS[field], from: from[field], to: to[field] }));
}

export type SettingsChange =
	| { readonly kind: 'done' }
	| { readonly kind: 'problems'; readonly problems: readonly FieldProblem[] }
	/** Somebody else saved first: what they have now and where it differs from what was typed. */
	| {
			readonly kind: 'conflict';
			readonly version: number;
			readonly differences: readonly FieldChange[];
	  };

export function readShopRules(context: Context) {
	const shop = findShop(context.db, context.shopId);
	invariant(shop, 'the session names a shop that is gone');
	return { text: settingsText(shop), version: shop.version, currency: shop.currency };
}

/** Saves the shop's rules as typed; jobs in hand keep the rules they were released with. */
export function changeSettings(
	context: Context,
	text: SettingsText,
	version: number
): SettingsChange {
	const read = readSettings(text);
	if (!read.ok) return { kind: 'problems', problems: read.problems };
	return write(context.db, (tx) => {
		const before = findShop(tx, context.shopId);
		invariant(before, 'the session names a shop that is gone');
		const old = settingsText(before);
		const wanted = settingsText({ ...before, ...read.rules });
		if (before.version !== version)
			return {
				kind: 'conflict',
				version: before.version,
				differences: differences(old, wanted)
			};
		const changes = differences(old, wanted);
		if (changes.length === 0) return { kind: 'done' };
		updateShopRules(tx, context.shopId, version, read.rules);
		appendHistory(tx, context, {
			action: 'changed shop rules',
			entity: 'shop',
			entityId: context.shopId,
			summary: `Changed ${changes.map(tell).join('; ')}.`,
			before: old,
			after: wanted
		});
		return { kind: 'done' };
	});
}

const tell = ({ label, from, to }: FieldChange): string =>
	`${label} from ${from || 'none'} to ${to || 'none'}`;

import { m } from '$lib/paraglide/messages';

export interface MenuItem {
	readonly href: string;
	readonly label: () => string;
	/** Shown to whoever holds this permission. */
	readonly permission: string;
}

/** The same order on every page, for everybody. */
export const MENU: readonly MenuItem[] = [
	{ href: '/jobs', label: m.shell_menu_jobs, permission: 'jobs.read' },
	{ href: '/site', label: m.shell_menu_site, permission: 'site.read' },
	{ href: '/buy', label: m.shell_menu_buy, permission: 'orders.read' },
	{ href: '/orders', label: m.shell_menu_orders, permission: 'orders.read' },
	{ href: '/rack', label: m.shell_menu_rack, permission: 'rack.read' },
	{ href: '/profiles', label: m.shell_menu_profiles, permission: 'catalog.read' },
	{ href: '/materials', label: m.shell_menu_materials, permission: 'catalog.read' },
	{ href: '/stock', label: m.shell_menu_stock, permission: 'prices.read' },
	{ href: '/suppliers', label: m.shell_menu_suppliers, permission: 'prices.read' },
	{ href: '/mailbox', label: m.shell_menu_mailbox, permission: 'mailbox.read' },
	{ href: '/people', label: m.shell_menu_people, permission: 'people.manage' },
	{ href: '/settings', label: m.shell_menu_settings, permission: 'settings.read' },
	{ href: '/history', label: m.shell_menu_history, permission: 'history.read' }
];

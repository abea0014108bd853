/**
 * Passwords that guessers try first, in lower case. The length rule refuses most well-known ones already;
 * the short words are here because digits and marks added to them (`password123!`) are tried just as early.
 */
export const COMMON_PASSWORDS: ReadonlySet<string> = new Set(
	`
password passw0rd p@ssword p@ssw0rd pa55word passwort contrasena contraseña motdepasse parola senha wachtwoord
qwerty qwertyui qwertyuio qwertyuiop qwertz azerty asdfgh asdfghjk asdfghjkl zxcvbn zxcvbnm
1q2w3e4r 1q2w3e4r5t 1q2w3e4r5t6y 1qaz2wsx 1qaz2wsx3edc 1qazxsw2 qazwsx qazwsxedc qwe123 qweasd qweasdzxc zaq12wsx
q1w2e3r4 q1w2e3r4t5 q1w2e3r4t5y6 1234qwer 12345qwert 123qwe 123qweasd 123qweasdzxc qwer1234 asdf1234 abcd1234 abc123
a1b2c3d4 a1b2c3d4e5 aa123456 a123456789 a1234567890 123456789a 1234567890a 0987654321 9876543210 1234567890 0123456789
12345678910 123456789123 123456789012 1234567891 1234567899 1029384756 1122334455 1212121212 1231231231 123123123123
1020304050 5555555555 1111111111 0000000000 9999999999 7777777777 8888888888 6666666666 1357924680 2468013579
letmein letmeinnow welcome welcomeback welcome1 login loginlogin admin administrator administrador root rootroot
changeme changemenow changeit default guest guestguest temp temporary test testing testtest testuser tester
secret topsecret mysecret trustno1 iloveyou iloveyouu ilovehim iloveher iloveme iloveyou1 iloveyou2 loveyou lovelove
sunshine princess princesa dragon monkey football baseball basketball soccer hockey softball volleyball
superman batman spiderman starwars pokemon pikachu minecraft fortnite computer internet samsung iphone android google
facebook instagram youtube microsoft windows master shadow michael jennifer jessica ashley daniel charlie thomas
jordan hunter buster whatever nothing nopassword password1 password12 password123 password1234 passwordpassword
superstar chocolate butterfly elizabeth alexander christopher mickeymouse snoopy garfield cheese cookie cookies
summer winter spring autumn january february march april june july august september october november december
monday tuesday wednesday thursday friday saturday sunday liverpool chelsea arsenal barcelona realmadrid
america mexico canada texas california chicago newyork
qwerty123456 qwerty12345 qwerty1234567 qwertyuiop123 asdfghjkl123 zxcvbnm123 correcthorsebatterystaple
lapwing lapwinglapwing canopy canopycanopy awning awningawning flashing sheetmetal sheetmetal1 metalshop workshop
shoplead estimator purchaser installer owner estimating trimshop
`
		.trim()
		.split(/\s+/)
);

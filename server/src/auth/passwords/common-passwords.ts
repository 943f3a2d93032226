// Written from memory of what is used most often; eight letters or more count as they stand, shorter ones are
// refused with anything but letters behind them, because the stem is what is looked up.
const WORDS = `
password passw0rd p@ssword p@ssw0rd pa55word passwort motdepasse contrasena parola senha wachtwoord haslo
qwerty qwertyuiop qwertzuiop qwertz azerty azertyuiop asdfgh asdfghjkl zxcvbn zxcvbnm qazwsx qazwsxedc qweasd qweasdzxc
qwerty123 1q2w3e4r 1q2w3e4r5t 1qaz2wsx 1qaz2wsx3edc zaq12wsx zaq1zaq1 q1w2e3r4 q1w2e3r4t5 asdf1234 qwer1234 1234qwer
12345678 123456789 1234567890 0123456789 987654321 9876543210 87654321 11111111 111111111 00000000 000000000
12341234 12121212 11223344 112233445566 123123123 123321123 147258369 159357159 123654789 789456123 741852963
11112222 22222222 33333333 55555555 66666666 77777777 88888888 99999999 10203040 13579246 24681012 31415926 14142135
abcdefgh abcd1234 abc12345 abcabcabc a1b2c3d4 aa123456 aaaaaaaa a1234567 abc123456 abcdef123 xxxxxxxx zzzzzzzz
letmein letmeinnow welcome welcome1 welcome123 changeme changeit changethis default defaultpass secret secret123 topsecret
admin administrator adminadmin root rootroot toor guest guestguest user username test testtest testing tester testuser
login logmein access access14 master masterkey system sysadmin manager operator service support server backup
iloveyou iloveu loveyou lovelove love loveme lover ilovegod trustno1 trustme whatever nothing something anything
football baseball basketball softball hockey soccer tennis golf golfer rugby cricket swimming running fishing hunting
dragon monkey tiger lion panther eagle falcon hawk wolf bear shark dolphin butterfly elephant kitten puppy horse
princess prince queen king angel angels baby babygirl babyboy sweetheart sweetie honey sugar cookie chocolate
sunshine rainbow summer winter spring autumn flower flowers sunflower rose lily daisy jasmine violet orchid
superman batman spiderman wonderwoman hulk joker hero ninja samurai warrior knight wizard phantom ghost shadow
starwars startrek pokemon pikachu mario zelda minecraft fortnite naruto hellokitty snoopy garfield simpson
michael michelle jennifer jessica jordan thomas daniel andrew anthony joshua matthew robert william charlie george
nicole amanda ashley samantha stephanie elizabeth victoria natalie patricia maria sandra alexander alexandra benjamin
christopher jonathan nicholas richard steven martin patrick oliver maximilian sebastian dominik katharina
freedom liberty america england london paris berlin madrid moscow tokyo canada australia mexico brazil france germany
computer internet network windows linux ubuntu android iphone samsung google facebook twitter amazon microsoft apple
mustang ferrari porsche corvette mercedes toyota honda yamaha harley suzuki kawasaki chevrolet
music guitar drummer piano violin trumpet rockstar metallica nirvana slipknot beatles eminem
audio stereo speaker speakers headphone headphones amplifier turntable vinyl hifi loudness microphone oscilloscope
killer hunter ranger soldier marine sniper gunner fighter boxer rocket thunder lightning storm hurricane tornado
diamond silver golden gold platinum crystal emerald sapphire ruby pearl
cheese pepper ginger banana orange cherry peaches strawberry blueberry coffee pizza burger butter pumpkin
jesus jesuschrist christ heaven blessed faith gospel church believe
blink182 ncc1701 matrix gandalf merlin excalibur hogwarts voldemort
asshole bullshit fuckyou fuckme fuckoff motherfucker bastard
happy happyday smile smiley funny lucky luckyone forever friends friendship family mother father sister brother
monday tuesday wednesday thursday friday saturday sunday january february march april june july august
september october november december birthday christmas halloween easter holiday newyear
company business office finance account money dollar millionaire invest
student teacher college university school library science history physics chemistry
correcthorsebatterystaple correct horse battery staple
drowssap ytrewq poiuytrewq lkjhgfdsa mnbvcxz
computer1 internet1 football1 princess1 sunshine1 superman1 michael1 dragon12 monkey12 shadow12
password1 password12 password123 password1234 password12345 password123456
administrator1 admin123 admin1234 admin12345 root1234 test1234 test12345 user1234 guest1234 pass1234 pass12345 passpass
welcome2024 welcome2025 welcome2026 summer2024 summer2025 summer2026 winter2024 winter2025 winter2026
spring2025 spring2026 autumn2025 autumn2026
`;

/** The passwords that are tried first, in lower case. */
export const COMMON_PASSWORDS: ReadonlySet<string> = new Set(
  WORDS.split(/\s+/).filter((word) => word !== ''),
);

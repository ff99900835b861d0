/**
 * What people who try passwords try first: some three hundred of the most common passwords and parts of passwords,
 * written down from memory, in small letters and without digits in place of letters. Length alone refuses them as they
 * stand; here they are refused as the whole of something longer.
 */
const words = `
password passwort passwords passw motdepasse contrasena parola haslo senha wachtwoord losenord kennwort geheim secret
admin administrator root user guest test tester testing default changeme change letmein welcome willkommen bienvenue
welcom login logon signin access master system server service support manager office company business computer
laptop internet network router windows microsoft google apple android iphone samsung facebook twitter instagram
youtube amazon netflix linkedin spotify pokemon minecraft roblox fortnite
qwerty qwertz azerty qwertyuiop qwertzuiop azertyuiop asdf asdfgh asdfghjkl asdfghjk yxcvbn zxcvbn zxcvbnm poiuytrewq
lkjhgfdsa mnbvcxz qazwsx qazwsxedc wsxedc edcrfv qweasd qweasdzxc asdzxc qwer wert asdfg zxcv qwe asd zxc aaa abc abcd
abcde abcdef abcdefg abcdefgh abcdefghij abcdefghijkl xyz zyx
iloveyou ilove loveyou love lover lovely loveme mylove forever always together heart kiss kisses honey sweet sweety
sweetheart darling baby babygirl babyboy angel angels princess prince queen king beautiful pretty cutie
dragon monkey tiger lion panther wolf eagle falcon hawk phoenix shark dolphin turtle rabbit kitten kitty puppy
horse pony mustang bear panda snake spider butterfly penguin chicken cookie
sunshine sunflower flower flowers rainbow summer winter spring autumn sommer frueh herbst january february march april
june july august september october november december monday tuesday wednesday thursday friday saturday sunday
shadow ghost killer hunter ranger soldier warrior ninja samurai pirate wizard magic merlin gandalf hobbit matrix
superman batman spiderman ironman hulk captain starwars startrek skywalker jedi yoda vader trinity neo
football fussball soccer baseball basketball hockey tennis golf rugby cricket skate surfer racing runner
liverpool arsenal chelsea barcelona realmadrid juventus bayern schalke dortmund yankees cowboys lakers steelers
michael daniel thomas andreas robert william james john david joseph charles christopher anthony matthew joshua andrew
jordan george richard patrick steven kevin brian jason justin austin brandon alexander alexandra maria anna sarah
jessica jennifer nicole michelle amanda melissa stephanie ashley samantha elizabeth victoria charlie maggie buster
harley ferrari porsche mercedes corvette camaro yamaha honda toyota nissan tesla prius leaf ampera volt
freedom liberty america england deutschland france italia london berlin paris madrid newyork texas california
chocolate cheese banana orange cherry pepper ginger coffee pizza whatever nothing something trustno trust hello
helloworld hallo bonjour hola goodbye please thankyou jesus christ heaven blessed church bible
money dollar cash million diamond silver golden platinum lucky winner success power energy electric
battery batterie akku charger charge voltage ampere hybrid traction workshop werkstatt garage mechanic repair
purple yellow green black white blue red maroon
fuckyou fuck asshole bitch sexy hottie bigdaddy daddy mommy mother father brother sister family friend friends
hacker cheater player gamer music guitar piano metal rock punk metallica nirvana slipknot eminem beatles
school student teacher college university science history doctor nurse police
mypassword mypass thepassword newpassword oldpassword passphrase pass secure security private public temp temporary
`;

export const commonPasswords: ReadonlySet<string> = new Set(words.trim().split(/\s+/));

/**
 * Words that passwords are most often made of, written down from common knowledge; no leaked list was copied. Alone they
 * are a few hundred; `passwordRules.ts` refuses them in any case, with letters written as digits, with digits and signs
 * around them, doubled, and two together, which covers the commonly published lists far better than their first few
 * thousand lines would. Lower case, one group a line.
 */
const everyday = `
password passwort passord parola contrasena motdepasse senha wachtwoord haslo salasana losenord heslo parole passphrase
pass passwd pwd secret secrets private letmein letmeon openup open opensesame sesame access access granted enter entrance
login logon signin signon welcome willkommen bienvenue hello hallo hola goodbye changeme change changeit changethis
newpass mypass mypassword thispassword password temp temporary temppass default standard test testing tester test user
guest demo sample example try trial admin administrator root toor superuser sysadmin system server network master
user username nobody someone anyone everyone unknown nothing something whatever whatsoever forgot forgotten remember
iloveyou loveyou loveme iloveme ihateyou lovely love lover lovers forever always never baby babygirl babyboy angel
angels heaven princess prince queen king kings sweet sweety sweetie sweetheart honey darling sugar candy cookie cookies
beautiful pretty sexy sexygirl hottie cutie friend friends bestfriend family mother father mommy daddy mama papa sister
brother football fussball soccer baseball basketball softball hockey tennis rugby cricket golf golfer swimming surfing
liverpool arsenal chelsea everton barcelona realmadrid juventus manchester united yankees cowboys lakers bulls eagles
steelers packers redsox dodgers rangers raiders celtic monkey dragon dragons tiger tigers lion lions panther panthers
eagle falcon hawk horse horses pony puppy kitty kitten cat cats dog dogs doggy bear bears wolf wolves snake spider
butterfly dolphin dolphins shark fish bunny rabbit turtle penguin panda elephant chicken buster max bella charlie
sunshine sunset sunrise sunflower rainbow summer winter spring autumn january february march april may june july august
september october november december monday tuesday wednesday thursday friday saturday sunday weekend holiday christmas
easter halloween birthday flower flowers rose roses daisy lily violet jasmine tulip garden orange apple banana cherry
strawberry peaches pepper cheese pizza chocolate coffee coconut vanilla cinnamon ginger butter bacon whiskey corona
purple yellow green blue red black white silver gold golden pink diamond crystal pearl ruby emerald sapphire
superman batman spiderman ironman wolverine superstar superhero starwars startrek skywalker jedi yoda vader matrix
gandalf hobbit frodo merlin wizard magic magician hogwarts harrypotter potter pokemon pikachu mario luigi zelda sonic
minecraft fortnite roblox warcraft starcraft counterstrike halo naruto goku saiyan simpson simpsons snoopy garfield
mickey minnie donald tinkerbell cinderella scooby winnie elvis beatles metallica slipknot nirvana eminem madonna
shadow hunter killer warrior ninja samurai pirate soldier rocket thunder lightning storm stormy phoenix
mustang corvette ferrari porsche mercedes chevy camaro harley yamaha honda toyota nissan subaru jaguar bmw audi
computer internet keyboard laptop windows microsoft google facebook twitter instagram youtube yahoo hotmail gmail
android iphone samsung nokia apple linux ubuntu oracle cisco database mysql postgres postgresql money dollar lucky
success winner winners power freedom liberty justice peace trust truth hope faith grace spirit soul jesus christ jesuschrist
god godislove blessed bless blessing church bible genesis trinity matthew mark luke john david daniel michael mike
michelle jessica ashley amanda jennifer jordan joshua andrew anthony robert thomas william george james jason justin
nicole nicholas samantha elizabeth charlotte hannah melissa natasha natalie rachel rebecca sarah sophie stephanie
tiffany veronica victoria alexander alexandra alexis brandon brittany chelsea christian christopher crystal danielle
dennis edward eric ethan gabriel hannah heather isabella jackson jacob jasmine jeremy jonathan joseph kevin kimberly
lauren madison maria marina martin maverick maxwell morgan nathan oliver olivia patrick peter phoenix richard ricardo
roberto ronald russell ryan sabrina scott sebastian sharon steven stephen taylor tyler vincent walter
america american england english london paris berlin germany deutschland france french italia italy spain espana brasil
brazil canada mexico mexican russia china japan australia india africa europe california texas florida newyork chicago
boston dallas houston phoenix denver seattle vegas hawaii alabama virginia carolina
asdf asdfg asdfgh asdfghj asdfghjk asdfghjkl qwer qwert qwerty qwertz azerty qwertyui qwertyuiop zxcv zxcvb zxcvbn zxcvbnm
qazwsx qazwsxedc wsxedc qweasd qweasdzxc asdzxc poiuytrewq lkjhgfdsa mnbvcxz abcd abcdef abcdefg abcabc xyz
hardcore player gamer gaming games playboy cheater trouble danger dangerous crazy stupid idiot monster devil demon
slayer assassin sniper bullet weapon metal rock rockstar music guitar drummer piano dance dancer dancing singer
student teacher school college university class science scientist engineer doctor nurse lawyer police firefighter army
marine navy airforce pilot captain boss manager office work business company corporate security safety
letters numbers number one two three four five six seven eight nine ten hundred thousand million
trustno trustnoone nopass nopassword noaccess fuckyou fuckoff bullshit asshole bitch pussy
`;

/** Words of this service and of the laboratory it is made for: the first that somebody who knows it would try. */
const ours = `
tablewright table wright calderpoint calder point laboratory labor lab labs bench analyst steward reviewer review edition
editions revision sheet sheets species source value values thermo thermochemistry thermodynamics chemistry chemist chemie
chimie quimica enthalpy entropy gibbs heatcapacity formation reference handbook element elements water molecule atom atoms
reaction kelvin joule kilojoule calorie calorimeter calorimetry mole codata
`;

const wordsOf = (text: string): string[] => text.split(/\s+/).filter(Boolean);

/** Common words, see above. */
export const commonWords: ReadonlySet<string> = new Set(wordsOf(everyday));

/** The product's and the trade's own words. */
export const ownWords: ReadonlySet<string> = new Set(wordsOf(ours));

/*
 * The words people build guessable passwords from, lower case, no digits. Written down from memory, not copied from a
 * leaked list: the perennial passwords of published top lists, keyboard walks, first names, months and seasons, teams,
 * animals, places, films, phrases, and the words of this trade and product. commonPasswords.ts expands them.
 */

const PERENNIAL = `
password passwords passwort passwd pass passw passphrase motdepasse contrasena contraseña senha wachtwoord heslo haslo
parola salasana lozinka losenord adgangskode secret secrets geheim letmein letme welcome welcomehome willkommen
bienvenue admin administrator root toor superuser user username guest login logon signin default changeme changethis
change temp temporary test tester testing testtest demo example sample access master mastermind god sysadmin system
server database backup oracle manager office company business internet computer laptop desktop windows linux ubuntu
debian android iphone apple google gmail yahoo hotmail outlook facebook twitter instagram youtube netflix amazon
microsoft wordpress joomla cisco router wifi wireless network qwerty qwertz azerty qwertyuiop qwertzuiop asdf asdfgh
asdfghjkl zxcvbn zxcvbnm yxcvbnm qazwsx qazwsxedc qweasd qweasdzxc abc abcd abcde abcdef abcdefg abcdefgh abcxyz
iloveyou iloveu loveyou ilove lovely love lover lovers loveme lovelove babygirl babyboy baby sweety sweetie sweetheart
honey darling angel angels princess prince queen king kingdom sunshine sunflower flower flowers rainbow rose shadow
monkey dragon tiger lion eagle falcon hawk wolf wolves bear panther cobra viper phoenix unicorn butterfly dolphin
football baseball basketball soccer hockey tennis golf cricket rugby volleyball swimming skiing skate snowboard surfing
superman batman spiderman ironman wolverine avengers hulk joker naruto pokemon pikachu mario zelda minecraft fortnite
roblox warcraft starcraft counterstrike callofduty halo starwars startrek skywalker vader yoda jedi matrix gandalf
frodo hobbit hogwarts harrypotter potter gameofthrones whatever trustno trustme trustnoone freedom liberty forever
nothing something anything everything everyone nobody somebody mustang ferrari porsche mercedes corvette camaro
chevrolet chevy ford toyota honda yamaha suzuki kawasaki harley ducati bmw audi volkswagen volvo subaru nissan mazda
hello helloworld hellokitty hello hi hey goodbye goodmorning goodnight thankyou please ninja samurai pirate wizard
hunter killer killers death destroy warrior soldier ranger sniper trooper maverick rocket thunder lightning storm
cheese chocolate cookie cookies pepper ginger banana orange apple cherry lemon strawberry peaches pumpkin coffee
whiskey vodka tequila beer pizza burger bacon chicken popcorn candy sugar butter pancake muffin cupcake
diamond crystal silver golden gold platinum emerald ruby sapphire jewel treasure money dollar dollars euro cash rich
million millionaire bitcoin crypto ethereum trading casino poker lucky winner champion champions legend legends
jesus jesuschrist christ god godisgood godislove bless blessed blessing faith grace heaven hope peace prayer church
amen allah islam muhammad krishna ganesh buddha shiva angelic devil demon satan lucifer vampire zombie ghost
mother father mommy daddy mama papa brother sister family friend friends bestfriend bff grandma grandpa husband wife
trinity genesis exodus revelation gospel bible scooter scooby scoobydoo snoopy garfield mickey minnie donald pluto
tweety bugsbunny simpsons homer bart lisa southpark cartman kenny stitch nemo simba bambi tinkerbell cinderella
metallica nirvana slipknot megadeth acdc pinkfloyd ledzeppelin beatles rolling queen eminem drake rihanna beyonce
blackpink bts onedirection justinbieber taylorswift michaeljackson elvis music guitar drummer piano singer dancer
cowboy cowboys patriots steelers packers raiders eagles broncos dolphins lakers celtics bulls warriors yankees redsox
dodgers cubs giants rangers mets arsenal chelsea liverpool manchester manunited manchesterunited mancity barcelona
realmadrid juventus milan intermilan bayern bayernmunich borussia dortmund schalke celtic everton tottenham ajax
feyenoord galatasaray fenerbahce besiktas benfica porto sporting ronaldo messi neymar beckham maradona zidane
`;

const CALENDAR_AND_PLACES = `
january february march april may june july august september october november december januar februar maerz märz mai
juni juli oktober dezember janvier fevrier mars avril juin juillet aout septembre octobre novembre decembre enero
febrero marzo abril mayo junio julio agosto septiembre octubre noviembre diciembre spring summer autumn fall winter
summertime wintertime springtime fruehling frühling sommer herbst winter primavera verano otono invierno printemps ete
hiver lente zomer herfst monday tuesday wednesday thursday friday saturday sunday montag dienstag mittwoch donnerstag
freitag samstag sonntag weekend holiday holidays birthday christmas xmas easter newyear halloween vacation
london paris berlin munich muenchen hamburg frankfurt vienna wien zurich geneva rome roma milano madrid barcelona
lisbon porto amsterdam rotterdam brussels copenhagen stockholm oslo helsinki warsaw prague budapest athens istanbul
ankara moscow kiev dublin edinburgh glasgow cardiff manchester liverpool birmingham newyork losangeles chicago houston
dallas austin boston seattle denver phoenix miami atlanta detroit philadelphia sanfrancisco sandiego lasvegas toronto
montreal vancouver sydney melbourne brisbane perth auckland tokyo osaka kyoto seoul beijing shanghai hongkong
singapore bangkok manila jakarta mumbai delhi bangalore chennai kolkata karachi lahore dhaka dubai cairo lagos nairobi
johannesburg capetown casablanca mexico brasil brazil argentina colombia chile peru venezuela cuba america usa canada
england scotland ireland wales britain unitedkingdom france germany deutschland austria schweiz switzerland italy
italia spain espana portugal holland nederland netherlands belgium denmark sweden norway finland poland polska
czech hungary romania bulgaria greece turkey turkiye russia ukraine israel egypt morocco nigeria kenya southafrica
india pakistan bangladesh china japan korea vietnam thailand indonesia malaysia philippines australia newzealand
california texas florida hawaii alaska nevada arizona colorado virginia georgia carolina montana dakota
`;

const NAMES = `
aaron abigail adam adrian adriana ahmed aidan alan albert alberto alejandro aleksandra alex alexa alexander alexandra
alexandre alexis alfred alfredo ali alice alicia alison allison alyssa amanda amber amelia amy ana anastasia anderson
andrea andreas andrei andrew andrey andy angela angelica angelina angelo anita ann anna anne annette annie anthony
antoine anton antonia antonio april arianna ariel arthur arturo ashley ashton aurora austin ava barbara beatrice
beatriz becky ben benjamin bernard bernd beth bethany betty bianca bill billy bob bobby bonnie brad bradley brandon
brandy brenda brian brianna bridget brittany brooke bruce bruno bryan caitlin caleb cameron camila camille carina
carla carlos carmen carol carolina caroline caroline carrie casey cassandra cassie catherine cecilia charles charlie
charlotte chelsea cheryl chloe chris christian christina christine christoph christopher cindy claire clara claudia
cody colin connor corey courtney craig crystal cynthia daisy dakota dale dan dana daniel daniela danielle danny
darren dave david dawn dean debbie deborah denis denise dennis derek diana diane diego dieter dimitri dominic
dominik dominique donald donna dorothy doug douglas dustin dylan eddie edgar eduardo edward elaine elena eleanor
elias elijah elisabeth elizabeth ella ellen emil emily emma emmanuel enrique eric erica erik erika erin ernesto ethan
eugene eva evan evelyn fabian faith fatima felipe felix fernanda fernando filip florian frances francesca francesco
francis francisco frank franz fred frederick freddy gabriel gabriela gabriele gary gavin gemma george georgia gerald
gerard gerhard gina giovanni gloria gonzalo gordon grace graham greg gregory guillermo gustavo hanna hannah hannes
hans harold harriet harry hassan heather hector heidi heinz helen helena helga henrik henry herbert holger holly hugo
ian ibrahim igor ingrid irene iris isaac isabel isabella isabelle ivan jack jackie jackson jacob jacqueline jade jaime
jake james jamie jan jana jane janet janice jared jasmin jasmine jason javier jay jean jeff jeffrey jenna jennifer
jenny jens jeremy jerry jesse jessica jill jim jimmy joan joanna joanne joao joe joel joerg joey johan johanna
johannes john johnny johnson jon jonas jonathan jordan jorge jose joseph josephine josh joshua joyce juan juanita
juergen julia julian juliana julie juliette julio justin karen karin karl karla kate katharina katherine kathleen
kathryn kathy katie katja katrin kayla keith kelly kelsey ken kenneth kerstin kevin khan kim kimberly klaus kristen
kristin kristina kumar kurt kyle lara larry lars laura lauren laurent lea leah lee lena leo leon leonard leonardo
leonie leslie liam lidia lily linda lisa logan lorenzo louis louise luca lucas lucia lucy luis luisa luke lydia
madeleine madison manuel manuela marc marcel marcela marco marcos marcus margaret maria mariana marie marina mario
marion mark markus marta martha martin martina marvin mary mason mathias mathieu matt matteo matthew matthias
maurice mauricio max maxime maximilian maya megan melanie melissa mia michael michaela michal michel michele michelle
miguel mike mikhail milan miranda miriam mohamed mohammed moises molly monica monika morgan mustafa nadia nadine
nancy naomi natalia natalie natasha nathalie nathan nathaniel neil nicholas nick nicola nicolas nicole nikita nikki
nikola nikolai nina noah noel nora norbert norman olga oliver olivia omar oscar otto pablo paige pamela paola pascal
patricia patricio patrick patrik paul paula pauline pavel pedro peggy penny peter petra philip philipp philippe
phillip pierre rachel rafael rainer ralf ralph ramon raphael raul raymond rebecca regina reinhard renate rene ricardo
richard rick ricky rita rob robert roberta roberto robin rodrigo roger roland roman ronald ronnie rosa rosemary
ross roxanne roy ruben rudolf russell ruth ryan sabine sabrina sally salvador sam samantha samuel sandra sandy santiago
sara sarah sasha scott sean sebastian sergei sergey sergio shane shannon sharon shaun shawn sheila sherry shirley
silvia simon simone smith sofia sonia sonja sophia sophie stacey stacy stefan stefanie stella stephan stephanie
stephen steve steven stewart stuart sue susan susanne suzanne sven sylvia tamara tanja tanya tara tatiana taylor ted
teresa terry theo theodore theresa thomas thorsten tiffany tim timothy tina tobias todd tom tommy toni tony tracy
travis trevor tristan tyler ulrich ulrike ursula uwe valentina valeria valerie vanessa vera veronica veronika vicky
victor victoria vincent viktor violet virginia vivian vladimir walter wanda wayne wendy werner whitney wilhelm will
william williams willie wolfgang xavier yolanda yvonne zachary zoe
`;

const PHRASES = `
opensesame letmeinnow letmeinplease passwordpassword mypassword thisismypassword yourpassword newpassword oldpassword
nopassword strongpassword securepassword secretpassword adminpassword rootpassword masterpassword companypassword
passwordadmin adminadmin rootroot testpassword temppassword temporarypassword initialpassword defaultpassword
welcometothejungle welcomeback welcometo changemenow changemeplease changeit pleasechange pleasechangeme donotchange
iloveyousomuch iloveyouforever iloveyoubaby iloveyoutoo iloveyouall iloveyoumore iloveyoumom imissyou iloveme
ilovemyself ilovemymom ilovemydad ilovemyfamily ilovemywife ilovemylife ilovejesus ilovegod ilovechocolate ilovemusic
ilovefootball ilovecats ilovedogs iloveparis ilovelondon lovemeforever loveyouforever foreverandever foreveryoung
bestfriends bestfriendsforever friendsforever mybestfriend mybaby myangel mylove mylife myfamily mychildren mylittlepony
correcthorse correcthorsebattery correcthorsebatterystaple batterystaple tobeornottobe tobeornotobe maytheforcebewithyou
theforce lukeskywalker darthvader starwarsfan lordoftherings thelordoftherings youshallnotpass harrypotterfan
winteriscoming hastalavista hakunamatata carpediem memento mementomori veni venividivici inshallah alhamdulillah
bismillah mashallah godblessyou godblessme godbless jesuslovesme jesusislord jesussaves praisethelord thankyoujesus
thankyougod thankyoulord ourfather ourfatherwhoartinheaven happybirthday happynewyear merrychristmas happychristmas
happyeaster trickortreat sunnyday goodday goodluck goodgirl goodboy badboy badgirl bigboy bigdaddy sugardaddy
superstar rockstar rockandroll heavymetal hiphop jinglebells yellowsubmarine bohemianrhapsody stairwaytoheaven
letitbe heyjude imagine wonderwall teamwork neverforget nevergiveup nevermind whoknows whocares whoami idontknow
idontcare dontknow dontforget dontforgetit forgotpassword forgot forgetit remember rememberme rememberthis
qwertyasdf qwertyasdfgh qwertyasdfzxcv asdfqwer asdfjkl asdfghjklqwertyuiop zxcvasdf zxcvasdfqwer qazwsxedcrfv
qazxsw qazxswedc qwertypassword passwordqwerty abcpassword passwordabc onetwothree onetwothreefour eenytwo
onceuponatime thequickbrownfox thequickbrownfoxjumps quickbrownfox loremipsum loremipsumdolor loremipsumdolorsitamet
foobar foobarbaz helloworldhello thisisatest thisisasecret thisisapassword itsasecret itsmypassword secretsecret
supersecret topsecret verysecret nottelling notmypassword nothacked hackme hackers hacker elitehacker leet anonymous
blinkblink drowssap nimda toortoor wordpass wordpassword
`;

const TRADE = `
stillfield stillfields stillfeld stillfieldlab emc emclab emctest emctesting emi emitest emcbench compliance
precompliance precompliancelab laboratory laboratories lab labor testlab testbench testhouse bench benchpc chamber
anechoic anechoicchamber semianechoic shielded shieldedroom screenedroom absorber groundplane turntable mast antenna
antennas antennafactor biconical logperiodic bilog horn hornantenna loop loopantenna monopole dipole receiver analyser
analyzer spectrum spectrumanalyzer spectrumanalyser preamplifier preamp attenuator cable coax coaxial connector probe
currentprobe nearfield nearfieldprobe lisn amn isn aan network artificialmains sweep sweeps sweepfile prescan peak
quasipeak quasi average detector bandwidth limit limits limitline limitlines margin verdict uncertainty calibration
calibrated calibrate frequency megahertz gigahertz kilohertz hertz decibel decibels microvolt emission emissions
immunity radiated conducted radiatedemissions conductedemissions harmonics flicker burst surge esd electrostatic
discharge technician engineer engineering engineers designer designers manager managers operator operators customer
customers client clients product products project projects measurement measurements measure measuring sample samples
report reports equipment electronics electronic electrical electric electricity voltage current resistor capacitor
inductor transistor oscillator clock ferrite shield shielding filter filters ground earth
`;

/** All words, each once. */
export const COMMON_WORDS: ReadonlySet<string> = new Set(
  [PERENNIAL, CALENDAR_AND_PLACES, NAMES, PHRASES, TRADE].join(' ').split(/\s+/).filter(Boolean),
);

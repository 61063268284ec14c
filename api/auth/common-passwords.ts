/** Passwords that are tried first, and the shapes they come in. Lower case; those under 8 letters are refused by length. */
const COMMON = new Set(
  `
!qaz2wsx 00000000 0123456789 10203040 11111111 11223344 112233445566 12121212 12312312
123123123 12341234 12345678 123456781 123456789 1234567890 1234567899 123456789a 12345678a
12345679 1234567a 123456qwerty 1234qwer 123abc456 123qwe123 123qweasd 123qweasdzxc 13131313
14141414 147147147 147258369 159159159 159357456 19901990 1password 1q2w3e4r 1q2w3e4r!
1q2w3e4r5t 1qaz2wsx 1qazxsw2 20002000 20202020 22222222 321321321 4321rewq 456789123
55555555 654321654 66666666 741852963 77777777 789456123 88888888 963852741 987654321
9876543210 99999999 a1234567 a12345678 a123456789 a1b2c3d4 aa123456 aa12345678 abc12345
abc123456 abc123abc abcd1234 abcd12345 abcdefg1 abcdefgh abracadabra access123 access14
admin123 admin123! admin1234 adminadmin administrator administrator1 alexander alexandra
alohomora america1 anderson andrew12 angel123 angels12 anthony1 argentina arsenal1 asd12345
asdf1234 asdfasdf asdfghjk asdfghjk1 asdfghjkl asdfjkl1 australia autumn12 autumn123
autumn2025 autumn2026 azerty123 azertyui azertyuiop babygirl babygirl1 bailey12 barcelona
baseball baseball1 basketball batman123 beautiful beautiful1 benjamin bestfriend blessed1
blessing bonjour1 brasil12 broncos1 buster12 butterfly butterfly1 california caroline
celtic12 changeit changeme changeme1 changeme123 charlie1 cheese12 chelsea1 chevrolet
chicago1 chocolate chocolate1 chouchou christian cinderella clinical1 clinictrial computer
computer1 confidential contrasena cookie12 corvette counter1 counterstrike cowboys1 daniel12
danielle database dataentry december default1 default123 deutschland diablo12 doctor123
doudou12 dragon12 dragon123 eagles12 elizabeth england1 enter123 everton1 facebook facebook1
february ferrari1 firstpass flower12 flowers1 football football1 forever1 forever21 france12
freedom1 freedom12 friday12 friends1 friendship gandalf1 garfield geheim123 germany1
ginger12 godisgood gonzalez goodbye1 goodluck goodmorning google123 gorgeous gryffindor
guest123 guestguest hallo123 hallo1234 handsome harley12 harrypotter heaven12 hello123
hello1234 helloworld hernandez hogwarts honey123 hospital hospital1 hunter12 hunter123
ichliebedich ilovegod iloveme1 iloveyou iloveyou1 iloveyou2 initial1 instagram internet
internet1 isabella jackson1 january1 jennifer jessica1 jesus123 jesuschrist jonathan
jordan23 joshua12 juventus katherine killer12 killer123 lakers24 letmein1 letmein12
letmein123 letmeinn letmepass liberty1 linkedin liverpool liverpool1 lkjhgfdsa london12
loulou12 loveyou1 lucky123 lucky777 maggie12 manager1 manchester margaret marseille martinez
master12 master123 matthew1 max12345 medical1 mercedes merlin12 mexico12 michael1 michael23
michelle mickey12 minecraft mnbvcxz1 monday12 money123 monkey12 monkey123 motdepasse
mustang1 mypass123 mypassword mysql123 ncc1701d ncc1701e newcastle newpass1 newpassword
newyork1 nicholas nintendo nopassword november nurse123 october1 oldpassword opensesame
oracle12 p4ssword p@ssw0rd p@ssw0rd1 p@ssw0rd123 p@ssword pa$$w0rd pa$$word pa55w0rd
pa55word packers1 paris123 parola123 passw0rd passw0rd1 passw0rd123 password password!
password1 password1! password12 password123 password123! password1234 password12345
password2 password3 passwort passwort1 passwort123 patient1 patient123 patricia patrick1
pepper12 playstation poiuytrewq pokemon1 pokemon123 porsche1 portugal postgres princess
princess1 q1w2e3r4 q1w2e3r4t5 qazwsxedc qwe12345 qweasd123 qweasdzxc qweqwe123 qwer1234
qwerty1! qwerty12 qwerty123 qwerty1234 qwerty123456 qwertyui qwertyuiop qwertz12 qwertz123
qwertzuiop rainbow1 rainbow12 ranger12 rangers1 realmadrid redsox12 research1 researcher
richard1 robert12 rocky123 rodriguez root1234 rootroot samantha samsung1 samsung123 schatz12
scotland secret12 secret123 senha123 september server12 sesame12 shadow12 shadow123
slytherin snapchat snoopy12 snowball soleil12 spiderman spring12 spring123 spring2025
spring2026 starcraft starwars starwars1 statistic1 statistics steelers stephanie summer12
summer123 summer2024 summer2025 summer2025! summer2026 sunday12 sunshine sunshine1 superman
superman1 sweetheart sweetie1 switzerland system12 temp1234 temporary temporary1 temppass
test1234 tester12 testing1 testing123 testtest tetherline tetherline1 thomas12 thompson
thx11381 tigger12 tinkerbell toor1234 topsecret trustno1 twitter1 user1234 username
username1 usuario1 veronica victoria voldemort wachtwoord warcraft welcome1 welcome1!
welcome12 welcome123 welcome123! welcome2 whatever whatever1 william1 winter12 winter123
winter2024 winter2025 winter2025! winter2026 xboxlive yankees1 yourpassword zaq12wsx
zaq1zaq1 zxc12345 zxcvbnm, zxcvbnm1 zxcvbnm123
`
    .trim()
    .split(/\s+/),
);

/** What is left of the words above without the digits and marks at their end. */
const STEMS = new Set([...COMMON].map(stemOf).filter((stem) => stem.length >= 5));

const RUNS = [
  'abcdefghijklmnopqrstuvwxyz',
  '01234567890',
  'qwertyuiopasdfghjklzxcvbnm',
  'qwertzuiop',
];

/** @param password in lower case */
export function isCommonPassword(password: string): boolean {
  if (COMMON.has(password)) return true;
  // A common word with a year, a mark or a few digits after it.
  const stem = stemOf(password);
  if (password.length - stem.length <= 6 && STEMS.has(stem)) return true;
  return isRepeated(password) || isRun(password);
}

function stemOf(word: string): string {
  return word.replace(/[0-9!?.*#$@_-]+$/, '');
}

/** One to four letters over and over. */
function isRepeated(password: string): boolean {
  return /^(.{1,4})\1+$/.test(password);
}

/** A walk along the alphabet, the digits or a row of keys, in either direction. */
function isRun(password: string): boolean {
  const backwards = [...password].reverse().join('');
  return RUNS.some((run) => run.includes(password) || run.includes(backwards));
}

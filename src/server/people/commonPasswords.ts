/** Passwords of ten and more characters that guessing starts with, in lower case. */
export const COMMON_PASSWORDS: ReadonlySet<string> = new Set(
  `1234567890 0123456789 0987654321 9876543210 12345678910 123456789012 1234567890123 1111111111
  0000000000 2222222222 5555555555 7777777777 9999999999 1212121212 1231231231 1234512345 1122334455
  123123123123 1q2w3e4r5t 1q2w3e4r5t6y q1w2e3r4t5 q1w2e3r4t5y6 1qaz2wsx3edc zaq12wsxcde3 qazwsxedcrfv
  qwertyuiop qwertyuiop1 qwerty12345 qwerty123456 qwertyqwerty asdfghjkl1 asdfghjkl; asdfasdfasdf
  zxcvbnm123 abcdefghij abcdefghijk abcd123456 abc1234567 abcdef1234 a123456789 a1234567890 aa12345678
  password12 password123 password1234 password12345 password123456 passwordpassword password01
  password2024 password2025 password2026 p@ssw0rd123 passw0rd123 mypassword mypassword1 changeme123
  changeme1234 letmein123 letmein1234 welcome123 welcome1234 welcome2024 welcome2025 welcome2026
  administrator admin12345 admin123456 adminadmin iloveyou12 iloveyou123 iloveyou1234 ilovemylife
  sunshine12 sunshine123 princess12 princess123 football12 football123 baseball12 baseball123
  basketball superman12 superman123 michael123 jennifer12 liverpool1 manchester trustno1234
  moonbounce moonbounce1 moonbounce123 earthmoonearth hamradio12 hamradio123 amateurradio radioamateur
  echotide12 echotide123 echotide1234 correcthorsebatterystaple`
    .split(/\s+/)
    .filter(Boolean),
);

package main
import ("fmt";"time";"gramlaw/internal/rulebook";"gramlaw/rules")
func main(){ for range 4 { t:=time.Now(); _,err:=rulebook.Load(rules.FS); fmt.Println(time.Since(t),err)} }

package track
import ("testing";"strings";"fmt";"time")
func TestZZ(t *testing.T){
 var c,pts []string
 for i:=0;i<300000;i++{ c=append(c,fmt.Sprintf("[%d.%04d,1]",i%2*2,i%10000)) }
 for i:=0;i<80000;i++{ pts=append(pts,pointFeature("A","[60,1]")) }
 pts=append(pts,lineFeature("["+strings.Join(c,",")+"]","{}"))
 s:=collection(pts[len(pts)-2001:]...)
 t0:=time.Now(); _,err:=ReadGeoJSON(strings.NewReader(s)); t.Log(len(s),err,time.Since(t0))
}

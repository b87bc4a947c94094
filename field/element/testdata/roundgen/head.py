"""What compact.py, slopes.py and thin.py share: bodies, points and the writing of ../round.json (mpmath; see
verify/testdata/hard/gen.py). Run them from this folder: compact.py OUT.json [PART OF A NAME]."""
import sys, json, math, random
sys.path.insert(0,'../../../../verify/testdata/hard')  # run from this folder
import gen
from gen import fr, certain, texts
random.seed(7)
Z={"centre":[0.0,0.0,0.0],"axis":[0.0,0.0,1.0],"ref":[1.0,0.0,0.0]}
def body(**k):
    d=dict(k); d.update(Z); return d
C=[]
def pts(r1,r2,h,n=40):
    """random points of all classes about rims (r,+-h) and faces, axis, far"""
    out=[]
    size=2*math.hypot(r2,h)
    w=min(r2-r1,2*h)
    def P(r,z,phi,tag): out.append(([r*math.cos(phi),r*math.sin(phi),z],tag))
    for _ in range(n):
        phi=random.uniform(0,2*math.pi)
        R=r2 if random.random()<.7 or r1==0 else r1
        z=random.choice([h,-h])
        d=10**random.uniform(-12,0.3)*r2
        t=random.uniform(0,2*math.pi)
        P(R+d*math.cos(t) if R+d*math.cos(t)>0 else 0.1,z+d*math.sin(t),phi,'rim 1e%d'%math.floor(math.log10(d)))
    for _ in range(n//3):
        phi=random.uniform(0,2*math.pi); R=r2 if random.random()<.6 or r1==0 else r1
        d=10**random.uniform(-12,-1)*r2*random.choice([1,-1])
        P(R+d,random.uniform(-h,h),phi,'wall')
        P(random.uniform(r1,r2),random.choice([-h,h])+10**random.uniform(-12,-1)*h*random.choice([1,-1]),phi,'end')
        P(random.uniform(r1,r2),random.uniform(-h,h),phi,'inside')
        d=w*10**random.uniform(-.5,1.5); t=random.uniform(0,2*math.pi)
        P(abs(R+d*math.cos(t)),h+d*math.sin(t),phi,'thinzone')
    for _ in range(n//4):
        R=math.hypot(r2,h)*10**random.uniform(0,.6); t=random.uniform(0,math.pi)
        P(R*math.sin(t),R*math.cos(t),random.uniform(0,6.28),'mid')
        R=math.hypot(r2,h)*10**random.uniform(.3,6); t=random.uniform(0,math.pi)
        P(R*math.sin(t),R*math.cos(t),random.uniform(0,6.28),'far')
    for e in (0,1e-12,1e-9,1e-6,1e-4,1e-2):
        for z in (h*random.uniform(-1,1),h*(1+10**random.uniform(-3,1))):
            P(e*r2,z,random.uniform(0,6.28),'axis')
    R=math.hypot(r2,h)
    P(0,R*2.4,0,'axis'); P(0,R*1.7,0,'axis'); P(1e-7*R,R*2.2,1,'axis'); P(0,-h*1.5,0,'axis')
    return out
def add(name,b,p,r1,r2,h,n=40):
    C.append((name,b,p,pts(r1,r2,h,n)))
U=lambda x,y,z:{'kind':'uniform','p':[x,y,z]}
A=lambda c:{'kind':'axial_z','c':c}
def cyl(nm,r,h,kinds,n=14):
    for k in kinds: add('cyl-%s-%s'%(nm,k),body(type='cylinder',radius=r,half_length=h),K[k],0,r,h,n)
def tube(nm,r1,r2,h,kinds,n=14):
    for k in kinds: add('tube-%s-%s'%(nm,k),body(type='tube',r1=r1,r2=r2,half_length=h),K[k],r1,r2,h,n)
K={'z':U(0,0,1.0),'x':U(.8,-.6,0.),'s':A(1.5)}
def write():
    """Works the cases out and writes them to the file of the first argument; those whose name holds the second, if there is one."""
    out=[]
    for name,b,p,ps in C:
        if len(sys.argv)>2 and sys.argv[2] not in name: continue
        P=[];PH=[];G=[];R=[];T=[]
        for x,t in ps:
            x=[float(v) for v in x]
            try: phi,g,reg=texts(certain(b,p,fr(x)),1.0)
            except Exception as e: print(name,x,t,repr(e)[:80]); continue
            P.append(x);PH.append(phi);G.append(g);R.append(reg);T.append(t)
        out.append({'id':'x-'+name,'body':b,'polarization':p,'points':P,'phi':PH,'g':G,'region':R,'tags':T})
        print(name,len(P),flush=True)
        json.dump(out,open(sys.argv[1],'w'))
